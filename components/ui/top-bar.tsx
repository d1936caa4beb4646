'use client';

import { type ReactNode, useId, useState } from 'react';
import { Mark, Wordmark } from './brand';
import { Icon } from './icon';
import { Link } from './link';
import { Ruler } from './log-ticks';

interface TopBarProps {
  brandHref: string;
  /** Beside the name, such as the choice of a collaboration. */
  switcher?: ReactNode;
  /** NavLink elements. */
  nav?: ReactNode;
  /** At the right end: find, running jobs, own menu. */
  tools?: ReactNode;
}

/** Mark, switch, navigation, tools; below 1024 px the navigation folds behind one button. */
export function TopBar({ brandHref, switcher, nav, tools }: TopBarProps) {
  const [isOpen, setOpen] = useState(false);
  const navId = useId();
  const hasNav = nav !== undefined && nav !== null;
  return (
    <header className="print:hidden">
      {/* biome-ignore lint/a11y/noStaticElementInteractions: Escape closes the open navigation from anywhere in the bar */}
      <div
        className="relative mx-auto flex min-h-[52px] py-1 lg:py-0 max-w-[1440px] flex-wrap items-center gap-x-2 px-[22px] md:gap-x-4 lg:min-h-[58px] lg:flex-nowrap lg:px-10 xl:gap-x-[22px]"
        onKeyDown={(event) => {
          if (event.key === 'Escape') setOpen(false);
        }}
      >
        <Link
          href={brandHref}
          className="flex min-h-11 shrink-0 items-center gap-[9px] hover:no-underline lg:min-h-0"
        >
          <Mark />
          <span className="max-md:sr-only lg:max-xl:sr-only">
            <Wordmark />
          </span>
        </Link>
        {switcher !== undefined && <div className="min-w-0 flex-1 lg:flex-initial">{switcher}</div>}
        {hasNav && (
          <nav
            id={navId}
            aria-label="Main"
            className={`${isOpen ? 'flex' : 'hidden'} order-last w-full flex-col border-rule border-t pb-2 lg:order-none lg:flex lg:w-auto lg:shrink-0 lg:flex-row lg:gap-0.5 lg:self-stretch lg:border-0 lg:pb-0`}
            onClickCapture={(event) => {
              if ((event.target as Element).closest('a')) setOpen(false);
            }}
          >
            {nav}
          </nav>
        )}
        <div className="ml-auto flex shrink-0 items-center md:gap-2.5">
          {tools}
          {hasNav && (
            <button
              type="button"
              className="flex size-11 items-center justify-center lg:hidden"
              aria-expanded={isOpen}
              aria-controls={navId}
              onClick={() => setOpen(!isOpen)}
            >
              <Icon name={isOpen ? 'close' : 'menu'} size={20} />
              <span className="sr-only">{isOpen ? 'Close the menu' : 'Open the menu'}</span>
            </button>
          )}
        </div>
      </div>
      <Ruler />
    </header>
  );
}
