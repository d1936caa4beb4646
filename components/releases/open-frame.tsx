import type { ReactNode } from 'react';
import { Mark, Wordmark } from '@/components/ui/brand';
import { Link } from '@/components/ui/link';
import { Ruler } from '@/components/ui/log-ticks';
import { SkipLink } from '@/components/ui/skip-link';
import type { Theme } from '@/components/ui/theme';
import { ThemeSwitch } from '@/components/ui/theme-switch';

/** Round a page that needs no account. */
export function OpenFrame({ theme, children }: { theme: Theme; children: ReactNode }) {
  return (
    <>
      <SkipLink />
      <header className="print:hidden">
        <div className="mx-auto flex min-h-[58px] max-w-[1184px] flex-wrap items-center justify-between gap-x-6 gap-y-1 px-[22px] py-1">
          <Link href="/" className="flex min-h-11 items-center gap-[9px] hover:no-underline">
            <Mark />
            <span className="max-sm:sr-only">
              <Wordmark />
            </span>
          </Link>
          <nav aria-label="Main" className="flex items-center gap-x-5 text-note">
            <Link href="/help">What the words mean</Link>
            <Link href="/sign-in" className="font-semibold">
              Sign in
            </Link>
          </nav>
        </div>
        <Ruler />
      </header>
      <main id="main" className="release-sheet mx-auto max-w-[1184px] px-[22px] pt-6 pb-12">
        {children}
      </main>
      <footer className="mx-auto flex max-w-[1184px] justify-end px-[22px] pb-8 print:hidden">
        <ThemeSwitch initial={theme} />
      </footer>
    </>
  );
}
