'use client';

import * as Primitive from '@radix-ui/react-popover';
import { type ReactNode, Suspense } from 'react';
import { floatingLook } from './menu-look';

interface PopoverRootProps {
  face: ReactNode;
  accessibleName?: string;
  className: string;
  align?: 'left' | 'right';
  /** What opens, said to readers. */
  title: string;
  children: ReactNode;
}

export function PopoverRoot({
  face,
  accessibleName,
  className,
  align = 'left',
  title,
  children,
}: PopoverRootProps) {
  return (
    <Primitive.Root defaultOpen>
      <Primitive.Trigger aria-label={accessibleName} className={className}>
        {face}
      </Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          aria-label={title}
          align={align === 'right' ? 'end' : 'start'}
          sideOffset={4}
          collisionPadding={8}
          className={`${floatingLook} max-h-[75dvh] w-[min(440px,calc(100vw-16px))] overflow-y-auto overscroll-contain p-4`}
        >
          <Suspense fallback={null}>{children}</Suspense>
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}

/** Inside a popover: what it wraps closes the panel when pressed. */
export const PopoverClose = Primitive.Close;
