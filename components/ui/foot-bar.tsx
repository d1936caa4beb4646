import type { ReactNode } from 'react';

/** Number and actions, fixed at the foot of a narrow screen; leaves room for itself. */
export function FootBar({ children }: { children: ReactNode }) {
  return (
    <>
      <div className="h-24 md:hidden" aria-hidden="true" />
      <div className="fixed inset-x-0 bottom-0 z-20 flex items-center gap-2 border-rule2 border-t bg-surface px-[22px] py-[11px] md:hidden print:hidden">
        {children}
      </div>
    </>
  );
}
