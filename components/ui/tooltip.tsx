'use client';

import * as Primitive from '@radix-ui/react-tooltip';
import type { ReactElement, ReactNode } from 'react';

interface TooltipProps {
  /** Said on hover and focus; Escape takes it away. Never the only place of a fact. */
  content: ReactNode;
  /** One control that can hold a ref. */
  children: ReactElement;
}

export function Tooltip({ content, children }: TooltipProps) {
  return (
    <Primitive.Provider delayDuration={400}>
      <Primitive.Root>
        <Primitive.Trigger asChild>{children}</Primitive.Trigger>
        <Primitive.Portal>
          <Primitive.Content
            sideOffset={6}
            collisionPadding={8}
            className="z-50 max-w-64 rounded border border-rule2 bg-surface px-3 py-2 text-ink2 text-note"
          >
            {content}
          </Primitive.Content>
        </Primitive.Portal>
      </Primitive.Root>
    </Primitive.Provider>
  );
}
