'use client';

import { useVirtualizer } from '@tanstack/react-virtual';
import type { ReactNode, RefObject } from 'react';
import { ROW_PX, type RowWindow } from './row-window';

/** Draws those of many rows that are in sight of their frame. */
export function RowsInSight({
  count,
  scroller,
  draw,
}: {
  count: number;
  scroller: RefObject<HTMLDivElement | null>;
  draw(window: RowWindow): ReactNode;
}) {
  const virtualizer = useVirtualizer({
    count,
    getScrollElement: () => scroller.current,
    estimateSize: () => ROW_PX,
    // The server draws the first screen before anything was measured.
    initialRect: { width: 1000, height: 700 },
    overscan: 12,
  });
  const items = virtualizer.getVirtualItems();
  const last = items.at(-1);
  return draw({
    indices: items.map(({ index }) => index),
    before: items[0]?.start ?? 0,
    after: last ? virtualizer.getTotalSize() - last.end : 0,
    measure: virtualizer.measureElement,
  });
}
