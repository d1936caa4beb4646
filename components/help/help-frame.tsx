import type { ReactNode } from 'react';
import { Mark, Wordmark } from '@/components/ui/brand';
import { Link } from '@/components/ui/link';
import { Ruler } from '@/components/ui/log-ticks';
import { SkipLink } from '@/components/ui/skip-link';

interface HelpFrameProps {
  /** The ways back to where the reader works; null for a visitor. */
  collaborations: { slug: string; name: string }[] | null;
  children: ReactNode;
}

const linkLook = 'flex min-h-11 items-center font-semibold';

/** What stands round the pages of the help, which anybody may read. */
export function HelpFrame({ collaborations, children }: HelpFrameProps) {
  return (
    <>
      <SkipLink />
      <header className="print:hidden">
        <div className="mx-auto flex min-h-[58px] max-w-[1440px] flex-wrap items-center gap-x-5 px-[22px] lg:px-10">
          <Link href="/" className="flex min-h-11 items-center gap-[9px] hover:no-underline">
            <Mark />
            <Wordmark />
          </Link>
          <Link href="/help" className={linkLook}>
            Help
          </Link>
          <Link href="/api-guide" className={linkLook}>
            API
          </Link>
          <span className="ml-auto flex flex-wrap gap-x-5">
            {collaborations === null && (
              <Link href="/sign-in" className={linkLook}>
                Sign in
              </Link>
            )}
            {collaborations?.map(({ slug, name }) => (
              <Link key={slug} href={`/${slug}`} className={linkLook}>
                <span className="sr-only">Back to </span>
                {name}
              </Link>
            ))}
          </span>
        </div>
        <Ruler />
      </header>
      <main id="main" className="mx-auto max-w-[1440px] px-[22px] pb-16 lg:px-10">
        {children}
      </main>
    </>
  );
}
