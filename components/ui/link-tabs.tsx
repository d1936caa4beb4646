import type { ReactNode } from 'react';
import { Link } from './link';

interface LinkTabsProps {
  label: string;
  tabs: { href: string; label: ReactNode; count?: number; isCurrent: boolean }[];
}

/** Tabs that are pages of their own: links in a navigation, so the address says which one is read. */
export function LinkTabs({ label, tabs }: LinkTabsProps) {
  return (
    <nav aria-label={label} className="mb-3.5 flex flex-wrap gap-x-[26px] border-rule border-b">
      {tabs.map((tab) => (
        <Link
          key={tab.href}
          href={tab.href}
          aria-current={tab.isCurrent ? 'page' : undefined}
          className={`flex min-h-9 items-center whitespace-nowrap border-b-[3px] pt-2 pb-1.5 hover:no-underline max-md:min-h-11 ${tab.isCurrent ? 'border-ink font-semibold text-ink' : 'border-transparent text-ink2 hover:text-ink'}`}
        >
          {tab.label}
          {tab.count !== undefined && (
            <span className="ml-1.5 font-normal text-ink3">{tab.count}</span>
          )}
        </Link>
      ))}
    </nav>
  );
}
