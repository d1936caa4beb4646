'use client';

import { useVirtualizer } from '@tanstack/react-virtual';
import { useRef } from 'react';

/** Below this all rows are drawn: the page scrolls, and the browser's own search finds every one. */
const MANY = 100;
const ROW_PX = 35;

/** Which of many rows are in sight of their frame; all of them while they are few. */
export function useVirtualRows(count: number) {
  const scroller = useRef<HTMLDivElement>(null);
  const isOn = count >= MANY;
  const virtualizer = useVirtualizer({
    count: isOn ? count : 0,
    getScrollElement: () => scroller.current,
    estimateSize: () => ROW_PX,
    // The server draws the first screen before anything was measured.
    initialRect: { width: 1000, height: 700 },
    overscan: 12,
  });
  if (!isOn) {
    const items = Array.from({ length: count }, (_, index) => ({ index }));
    return { isOn, scroller, items, before: 0, after: 0, measure: undefined };
  }
  const items = virtualizer.getVirtualItems();
  const first = items[0];
  const last = items.at(-1);
  return {
    isOn,
    scroller,
    items,
    before: first?.start ?? 0,
    after: last ? virtualizer.getTotalSize() - last.end : 0,
    measure: virtualizer.measureElement,
  };
}
