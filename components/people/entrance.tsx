import type { ReactNode } from 'react';
import { Mark, Wordmark } from '@/components/ui/brand';
import { Link } from '@/components/ui/link';
import { SkipLink } from '@/components/ui/skip-link';
import type { Theme } from '@/components/ui/theme';
import { ThemeSwitch } from '@/components/ui/theme-switch';
import { SampleGrowthArt } from './sample-growth-art';

/** The heading of an entrance page. */
export function EntranceTitle({ children }: { children: ReactNode }) {
  return (
    <h1 className="text-balance font-light text-[34px] leading-[1.12] tracking-[-0.012em] md:text-[38px]">
      {children}
    </h1>
  );
}

/** The two halves of every page before the laboratory: a form, and what the product is about. */
export function Entrance({ theme, children }: { theme: Theme; children: ReactNode }) {
  return (
    <div className="grid min-h-dvh lg:grid-cols-[minmax(0,4fr)_minmax(0,5fr)]">
      <SkipLink />
      <div className="flex flex-col px-[22px] pt-8 pb-8 md:px-14 lg:px-24 lg:pt-10">
        <div className="flex items-center gap-3">
          <Mark size={36} />
          <Wordmark size={27} />
        </div>
        <main
          id="main"
          // From the top, not in the middle: what comes line by line would move all that is there.
          className="flex w-full max-w-[400px] flex-1 flex-col pt-[max(2.5rem,15dvh)] pb-10 [&_button[type=submit]]:h-11 [&_input]:h-11"
        >
          {children}
        </main>
        <div className="flex flex-wrap items-center gap-x-6">
          <ThemeSwitch initial={theme} />
          <Link href="/help" className="flex min-h-11 items-center">
            Help
          </Link>
        </div>
      </div>
      <SampleGrowthArt />
    </div>
  );
}
