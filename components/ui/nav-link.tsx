'use client';

import { usePathname } from 'next/navigation';
import type { ReactNode } from 'react';
import { Link } from './link';

interface NavLinkProps {
  href: string;
  children: ReactNode;
  /** Current only on this very address, not on those below it. */
  exact?: boolean;
}

export function NavLink({ href, children, exact = false }: NavLinkProps) {
  const pathname = usePathname() ?? '';
  const isCurrent = pathname === href || (!exact && pathname.startsWith(`${href}/`));
  return (
    <Link
      href={href}
      aria-current={isCurrent ? 'page' : undefined}
      className={`relative flex min-h-11 items-center whitespace-nowrap hover:text-ink hover:no-underline lg:min-h-0 lg:px-[9px] xl:px-[11px] ${
        isCurrent
          ? 'font-semibold text-ink before:absolute before:inset-y-2 before:-left-3 before:w-[3px] before:bg-ink lg:before:hidden lg:after:absolute lg:after:inset-x-[11px] lg:after:-bottom-px lg:after:h-[3px] lg:after:bg-ink'
          : 'text-ink2'
      }`}
    >
      {children}
    </Link>
  );
}
