'use client';

import * as Primitive from '@radix-ui/react-popover';
import type { ReactNode } from 'react';
import { floatingLook, type MenuLook, menuLooks } from './menu';

interface PopoverProps {
  label: ReactNode;
  accessibleName?: string;
  look?: MenuLook;
  align?: 'left' | 'right';
  /** What opens, said to readers. */
  title: string;
  isOpen?: boolean;
  onOpenChange?(isOpen: boolean): void;
  children: ReactNode;
}

/** A button that opens a small panel with controls of its own; Escape gives the focus back. */
export function Popover({
  label,
  accessibleName,
  look = 'outlined',
  align = 'left',
  title,
  isOpen,
  onOpenChange,
  children,
}: PopoverProps) {
  return (
    <Primitive.Root open={isOpen} onOpenChange={onOpenChange}>
      <Primitive.Trigger
        aria-label={accessibleName}
        className={`flex items-center whitespace-nowrap ${menuLooks[look]}`}
      >
        {label}
      </Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          aria-label={title}
          align={align === 'right' ? 'end' : 'start'}
          sideOffset={4}
          collisionPadding={8}
          className={`${floatingLook} max-h-[75dvh] w-[min(440px,calc(100vw-16px))] overflow-y-auto overscroll-contain p-4`}
        >
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}

/** Inside a popover: what it wraps closes the panel when pressed. */
export const PopoverClose = Primitive.Close;
