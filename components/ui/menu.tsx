'use client';

import Link from 'next/link';
import { type KeyboardEvent, type ReactNode, useEffect, useId, useRef, useState } from 'react';
import { Icon } from './icon';

interface MenuProps {
  label: ReactNode;
  /** Says what the button is for where the label alone does not. */
  accessibleName?: string;
  children: ReactNode;
  align?: 'left' | 'right';
  look?: 'outlined' | 'quiet' | 'round';
}

const looks = {
  outlined: 'h-9 gap-1.5 rounded border border-rule px-2.5 font-semibold max-lg:h-11',
  quiet: 'h-9 gap-1.5 px-1 font-semibold text-act max-lg:h-11',
  round:
    'size-8 justify-center rounded-full bg-act-soft font-bold text-act text-chart max-lg:size-11',
};

/** A button that opens a short list of links and actions; arrows move, Escape closes. */
export function Menu({
  label,
  accessibleName,
  children,
  align = 'left',
  look = 'outlined',
}: MenuProps) {
  const [isOpen, setOpen] = useState(false);
  const root = useRef<HTMLDivElement>(null);
  const listId = useId();

  useEffect(() => {
    if (!isOpen) return;
    const closeOutside = (event: PointerEvent) => {
      if (!root.current?.contains(event.target as Node)) setOpen(false);
    };
    document.addEventListener('pointerdown', closeOutside);
    return () => document.removeEventListener('pointerdown', closeOutside);
  }, [isOpen]);

  const move = (event: KeyboardEvent<HTMLDivElement>) => {
    if (event.key === 'Escape' && isOpen) {
      event.stopPropagation();
      setOpen(false);
      root.current?.querySelector('button')?.focus();
      return;
    }
    if (event.key !== 'ArrowDown' && event.key !== 'ArrowUp') return;
    event.preventDefault();
    if (!isOpen) {
      setOpen(true);
      requestAnimationFrame(() => items(root.current)[0]?.focus());
      return;
    }
    const all = items(root.current);
    const here = all.indexOf(document.activeElement as HTMLElement);
    const step = event.key === 'ArrowDown' ? 1 : -1;
    all[(here + step + all.length) % all.length]?.focus();
  };

  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the keys move between the button and its list
    <div ref={root} className="relative" onKeyDown={move}>
      <button
        type="button"
        className={`flex max-w-[9.5rem] items-center md:max-w-[15rem] whitespace-nowrap ${looks[look]}`}
        aria-expanded={isOpen}
        aria-controls={listId}
        aria-label={accessibleName}
        onClick={() => setOpen(!isOpen)}
      >
        <span className="truncate">{label}</span>
        {look !== 'round' && <Icon name="down" size={14} />}
      </button>
      <div
        id={listId}
        hidden={!isOpen}
        className={`absolute top-full z-40 mt-1 min-w-48 rounded border border-rule2 bg-surface py-1 ${align === 'right' ? 'right-0' : 'left-0'}`}
        onClickCapture={(event) => {
          if ((event.target as Element).closest('[data-menu-item]')) setOpen(false);
        }}
      >
        {children}
      </div>
    </div>
  );
}

function items(root: HTMLElement | null): HTMLElement[] {
  return [...(root?.querySelectorAll<HTMLElement>('[data-menu-item]') ?? [])];
}

const itemLook =
  'flex min-h-9 w-full items-center gap-2 px-3.5 py-1 text-left text-ink text-note hover:bg-act-soft hover:no-underline focus-visible:-outline-offset-2 max-lg:min-h-11';

export function MenuLink({
  href,
  isCurrent = false,
  children,
}: {
  href: string;
  isCurrent?: boolean;
  children: ReactNode;
}) {
  return (
    <Link
      href={href}
      data-menu-item=""
      aria-current={isCurrent ? 'true' : undefined}
      className={`${itemLook} ${isCurrent ? 'font-semibold' : ''}`}
    >
      {children}
    </Link>
  );
}

export function MenuAction({ onSelect, children }: { onSelect(): void; children: ReactNode }) {
  return (
    <button type="button" data-menu-item="" className={itemLook} onClick={onSelect}>
      {children}
    </button>
  );
}

export function MenuRule() {
  return <hr className="my-1 border-rule border-t" />;
}
