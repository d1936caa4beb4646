'use client';

import { lazy, Suspense, useRef } from 'react';
import type { DialogProps } from './dialog-parts';

const DialogPanel = lazy(() =>
  import('./dialog-parts').then((parts) => ({ default: parts.DialogPanel })),
);

/**
 * Consequence first, then what is asked, then two buttons. It is loaded when it opens for the first
 * time: a page does not wait for what it may never show.
 */
export function Dialog(props: DialogProps) {
  const wasOpen = useRef(false);
  if (props.isOpen) wasOpen.current = true;
  if (!wasOpen.current) return null;
  return (
    <Suspense fallback={null}>
      <DialogPanel {...props} />
    </Suspense>
  );
}
