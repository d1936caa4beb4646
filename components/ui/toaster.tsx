'use client';

import { lazy, Suspense, useRef, useSyncExternalStore } from 'react';
import { toastStore } from './toast-store';

const ToasterPanel = lazy(() =>
  import('./toaster-panel').then((panel) => ({ default: panel.ToasterPanel })),
);

/** Where `announce` is shown and read out, once a layout; loaded with the first message. */
export function Toaster() {
  const messages = useSyncExternalStore(
    toastStore.subscribe,
    toastStore.read,
    toastStore.readOnServer,
  );
  const wasNeeded = useRef(false);
  if (messages.length > 0) wasNeeded.current = true;
  if (!wasNeeded.current) return null;
  return (
    <Suspense fallback={null}>
      <ToasterPanel />
    </Suspense>
  );
}
