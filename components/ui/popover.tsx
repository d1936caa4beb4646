'use client';

import { lazy, type ReactNode } from 'react';
import { type MenuLook, menuLooks } from './menu-look';
import { OpeningButton } from './opening-button';

const load = () => import('./popover-parts');
const PopoverRoot = lazy(async () => ({ default: (await load()).PopoverRoot }));

interface PopoverProps {
  label: ReactNode;
  accessibleName?: string;
  look?: MenuLook;
  align?: 'left' | 'right';
  /** What opens, said to readers. */
  title: string;
  children: ReactNode;
}

/** A button that opens a small panel with controls of its own; Escape gives the focus back. */
export function Popover({
  label,
  accessibleName,
  look = 'outlined',
  align,
  title,
  children,
}: PopoverProps) {
  const className = `flex items-center whitespace-nowrap ${menuLooks[look]}`;
  const button = { face: label, accessibleName, className };
  return (
    <OpeningButton
      {...button}
      opens="dialog"
      load={load}
      whenPressed={
        <PopoverRoot {...button} align={align} title={title}>
          {children}
        </PopoverRoot>
      }
    />
  );
}
