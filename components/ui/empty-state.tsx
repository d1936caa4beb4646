import type { ReactNode } from 'react';

interface EmptyStateProps {
  title: ReactNode;
  /** What is needed, and what happens then. */
  children: ReactNode;
  actions?: ReactNode;
}

/** A posterior that is not there yet, and the ways in. */
export function EmptyState({ title, children, actions }: EmptyStateProps) {
  return (
    <div className="grid items-center gap-[26px] py-4 md:grid-cols-[200px_1fr]">
      <svg
        className="max-md:hidden"
        width="200"
        height="120"
        viewBox="0 0 200 120"
        fill="none"
        aria-hidden="true"
      >
        <path
          d="M12 98C34 98 40 26 76 26S120 92 190 97"
          stroke="var(--rule2)"
          strokeWidth="1.8"
          strokeDasharray="4 5"
        />
        <path d="M4 98.5H196M12 98v8M56 98v4M100 98v8M144 98v4M188 98v8" stroke="var(--rule2)" />
        <rect x="141" y="20" width="3" height="78" fill="var(--rule2)" />
      </svg>
      <div>
        <h3 className="mb-1.5 text-section">{title}</h3>
        <div className="max-w-[60ch] text-ink2">{children}</div>
        {actions !== undefined && <div className="mt-4 flex flex-wrap gap-2">{actions}</div>}
      </div>
    </div>
  );
}
