import type { Ref } from 'react';

/** Below this all rows are drawn: the page scrolls, and the browser's own search finds every one. */
export const MANY = 100;
export const ROW_PX = 35;

/** Which rows are drawn, and the height of those above and below them [px]. */
export interface RowWindow {
  indices: readonly number[];
  before: number;
  after: number;
  /** Measures a drawn row. */
  measure?: Ref<HTMLTableRowElement>;
}

/** Rows of the first screen before anything was measured. */
const FIRST = 24;

export function allRows(count: number): RowWindow {
  return { indices: Array.from({ length: count }, (_, index) => index), before: 0, after: 0 };
}

/** The first rows, with room for the others. */
export function firstRows(count: number): RowWindow {
  const drawn = Math.min(count, FIRST);
  return {
    indices: Array.from({ length: drawn }, (_, index) => index),
    before: 0,
    after: (count - drawn) * ROW_PX,
  };
}
