import type { ReactNode } from 'react';
import { Icon } from './icon';
import { Link } from './link';

interface PageTitleProps {
  title: ReactNode;
  /** The way here: pages above this one, then what this one is called. */
  crumbs?: { href?: string; label: ReactNode }[];
  /** A StateMark at the end of the crumbs. */
  state?: ReactNode;
  /** One line under the title. */
  context?: ReactNode;
  actions?: ReactNode;
}

export function PageTitle({ title, crumbs = [], state, context, actions }: PageTitleProps) {
  return (
    <div className="flex flex-wrap items-end gap-x-5 gap-y-3 pt-5 pb-[18px]">
      <div className="min-w-0">
        {(crumbs.length > 0 || state !== undefined) && (
          <div className="mb-[3px] flex flex-wrap items-center gap-2 text-ink3 text-note">
            {crumbs.map(({ href, label }, index) => (
              <span key={href ?? String(label)} className="inline-flex items-center gap-2">
                {index > 0 && <Icon name="next" size={12} />}
                {href === undefined ? label : <Link href={href}>{label}</Link>}
              </span>
            ))}
            {state}
          </div>
        )}
        <h1 className="font-light text-title tracking-[-0.012em] max-md:text-statement">{title}</h1>
        {context !== undefined && <p className="mt-1.5 text-ink2">{context}</p>}
      </div>
      {actions !== undefined && (
        <div className="ml-auto flex flex-wrap items-center gap-2 max-md:ml-0">{actions}</div>
      )}
    </div>
  );
}
