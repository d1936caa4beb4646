import type { ReactNode } from 'react';
import { Mark, Wordmark } from '@/components/ui/brand';
import { Link } from '@/components/ui/link';
import { Ruler } from '@/components/ui/log-ticks';
import { SkipLink } from '@/components/ui/skip-link';

/** What stands round the pages of the help, which anybody may read. */
export function HelpFrame({ children }: { children: ReactNode }) {
  return (
    <>
      <SkipLink />
      <header className="print:hidden">
        <div className="mx-auto flex min-h-[58px] max-w-[1440px] items-center gap-5 px-[22px] lg:px-10">
          <Link href="/" className="flex min-h-11 items-center gap-[9px] hover:no-underline">
            <Mark />
            <Wordmark />
          </Link>
          <Link href="/help" className="flex min-h-11 items-center font-semibold">
            Help
          </Link>
          <Link href="/api-guide" className="flex min-h-11 items-center font-semibold">
            API
          </Link>
        </div>
        <Ruler />
      </header>
      <main id="main" className="mx-auto max-w-[1440px] px-[22px] pb-16 lg:px-10">
        {children}
      </main>
    </>
  );
}
