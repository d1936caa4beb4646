import type { ReactNode } from 'react';

/** The ground on which controls stand: five or six cells in a row, three by two, then one column. */
export function Console({
  children,
  foot,
  columns = 6,
}: {
  children: ReactNode;
  foot?: ReactNode;
  columns?: 5 | 6;
}) {
  return (
    <section
      className="rounded-plate bg-well px-[22px] py-3.5 max-md:-mx-[22px] max-md:rounded-none md:px-5 md:pt-4"
      aria-label="Assumptions"
    >
      <div
        className={`grid gap-y-3 md:grid-cols-3 ${columns === 5 ? 'xl:grid-cols-5' : 'xl:grid-cols-6'}`}
      >
        {children}
      </div>
      {foot !== undefined && (
        <div className="mt-2 flex flex-wrap items-end gap-x-[26px] gap-y-3 border-rule border-t pt-[13px]">
          {foot}
        </div>
      )}
    </section>
  );
}

/** A control with its name and present value above it. */
export function ConsoleCell({
  label,
  value,
  children,
}: {
  label: ReactNode;
  value?: ReactNode;
  children: ReactNode;
}) {
  return (
    <div className="min-w-0 border-rule md:px-4 md:max-xl:not-[:nth-child(3n+1)]:border-l md:max-xl:[:nth-child(3n+1)]:pl-0 xl:border-l xl:last:pr-0 xl:first:border-l-0 xl:first:pl-0">
      <div className="flex items-baseline justify-between gap-2 whitespace-nowrap text-ink2 text-note">
        <span className="truncate">{label}</span>
        {value !== undefined && <b className="text-ink text-value">{value}</b>}
      </div>
      {children}
    </div>
  );
}
