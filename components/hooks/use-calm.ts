'use client';

import { type RefObject, startTransition, useEffect, useRef, useState } from 'react';

interface Pace {
  /** Under a hand: at most one change in so many milliseconds. */
  paceMs: number;
  /** Given: while it is out of sight the value waits until the hand rests. */
  seen?: RefObject<Element | null>;
}

const REST_MS = 400;

/**
 * A value that follows another at its own pace, and at once when it was still before. What is drawn
 * from it gives way to what follows the hand.
 */
export function useCalm<Value>(value: Value, { paceMs, seen }: Pace): Value {
  const [calm, setCalm] = useState(value);
  const followedAt = useRef(Number.NEGATIVE_INFINITY);
  const isInSight = useInSight(seen);
  useEffect(() => {
    if (Object.is(value, calm)) return;
    const due = Math.max(0, followedAt.current + paceMs - performance.now());
    const timer = setTimeout(
      () => {
        followedAt.current = performance.now();
        startTransition(() => setCalm(() => value));
      },
      isInSight.current ? due : REST_MS,
    );
    return () => clearTimeout(timer);
  }, [value, calm, paceMs, isInSight]);
  return calm;
}

function useInSight(seen: Pace['seen']): RefObject<boolean> {
  const isInSight = useRef(true);
  useEffect(() => {
    const element = seen?.current;
    if (!element) return;
    const observer = new IntersectionObserver(([entry]) => {
      isInSight.current = entry.isIntersecting;
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, [seen]);
  return isInSight;
}
