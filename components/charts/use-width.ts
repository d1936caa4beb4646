'use client';

import { type RefObject, useEffect, useRef, useState } from 'react';

/**
 * Width of an element in px, so that a chart's text keeps its size at every width.
 *
 * @param initial what the server and the first paint assume
 */
export function useWidth<Element extends HTMLElement>(
  initial: number,
): [RefObject<Element | null>, number] {
  const ref = useRef<Element>(null);
  const [width, setWidth] = useState(initial);
  useEffect(() => {
    const element = ref.current;
    if (!element) return;
    const observer = new ResizeObserver(([entry]) => {
      const measured = Math.floor(entry.contentRect.width);
      if (measured > 0) setWidth(measured);
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
