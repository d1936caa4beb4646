'use client';

import { useMemo, useRef } from 'react';
import type { CellValue, DataColumn, Facet, TableView } from './column';
import { fold } from './column';

/** "RB 9" before "RB 10", letters whatever their case. */
const order = new Intl.Collator('en-GB', { numeric: true, sensitivity: 'base' });

export function compareCells(a: CellValue | undefined, b: CellValue | undefined): number {
  if (typeof a === 'number' && typeof b === 'number') return a - b;
  return order.compare(String(a ?? ''), String(b ?? ''));
}

/** Whether a row fits words and facets together. */
export function keepsRow<Row>(
  row: Row,
  view: TableView,
  facets: readonly Facet<Row>[],
  textOf: (row: Row) => string,
): boolean {
  const isIn = facets.every(({ id, keeps }) => {
    const value = view.facets[id];
    return value === undefined || value === '' || keeps(row, value);
  });
  return isIn && (view.words.trim() === '' || fold(textOf(row)).includes(fold(view.words)));
}

/**
 * The rows that fit, in the order that is asked for; what has no value comes last in both
 * directions, and rows of one value stay as they came.
 */
export function arrangeRows<Row>(
  rows: readonly Row[],
  columns: readonly DataColumn<Row>[],
  view: TableView,
  facets: readonly Facet<Row>[],
  textOf = (row: Row) => columns.map(({ value }) => value(row) ?? '').join(' '),
): Row[] {
  const kept = rows.filter((row) => keepsRow(row, view, facets, textOf));
  const column = columns.find(({ id, isUnsorted }) => id === view.sort?.id && !isUnsorted);
  if (!column) return kept;
  const sign = view.sort?.isDescending ? -1 : 1;
  return kept
    .map((row) => ({ row, value: column.value(row) }))
    .sort((a, b) => {
      if (a.value === null || b.value === null)
        return Number(a.value === null) - Number(b.value === null);
      return sign * compareCells(a.value, b.value);
    })
    .map(({ row }) => row);
}

/** A press on a head: numbers from the largest, words from A, then the other way, then as they came. */
export function nextSort<Row>(
  { id, isNumeric = false }: DataColumn<Row>,
  sort: TableView['sort'],
): TableView['sort'] {
  if (sort?.id !== id) return { id, isDescending: isNumeric };
  return sort.isDescending === isNumeric ? { id, isDescending: !isNumeric } : null;
}

/** What is selected after a box was pressed; with Shift all from the last pressed box to this one. */
export function nextSelection(
  selected: ReadonlySet<string>,
  choosable: readonly string[],
  id: string,
  from: string | null,
): Set<string> {
  const ends = [choosable.indexOf(from ?? id), choosable.indexOf(id)].sort((a, b) => a - b);
  const pressed = ends[0] < 0 ? [id] : choosable.slice(ends[0], ends[1] + 1);
  const next = new Set(selected);
  for (const one of pressed) selected.has(id) ? next.delete(one) : next.add(one);
  return next;
}

interface DataRows<Row> {
  rows: readonly Row[];
  columns: readonly DataColumn<Row>[];
  rowId(row: Row): string;
  /** What the words are looked for in; without it, all that the columns hold. */
  textOf?(row: Row): string;
  facets: readonly Facet<Row>[];
  view: TableView;
  selection?: TableSelection<Row>;
}

export interface TableSelection<Row> {
  ids: ReadonlySet<string>;
  onChange(ids: Set<string>): void;
  /** The name of a row's box: "Compare A-31". */
  label(row: Row): string;
  canSelect?(row: Row): boolean;
}

/** The shown rows of a table, and what its boxes do. */
export function useDataRows<Row>({
  rows,
  columns,
  rowId,
  textOf,
  facets,
  view,
  selection,
}: DataRows<Row>) {
  const shown = useMemo(
    () => arrangeRows(rows, columns, view, facets, textOf),
    [rows, columns, view, facets, textOf],
  );
  const lastPressed = useRef<string | null>(null);
  const selected = selection?.ids ?? new Set<string>();
  const choosable = selection
    ? shown.filter((row) => selection.canSelect?.(row) !== false).map(rowId)
    : [];
  const chosenHere = choosable.filter((id) => selected.has(id)).length;
  return {
    shown,
    selected,
    isAllSelected: choosable.length > 0 && chosenHere === choosable.length,
    isSomeSelected: chosenHere > 0 && chosenHere < choosable.length,
    toggle(id: string, isRange: boolean) {
      const from = isRange ? lastPressed.current : null;
      lastPressed.current = id;
      selection?.onChange(nextSelection(selected, choosable, id, from));
    },
    toggleAll(isSelected: boolean) {
      const next = new Set(selected);
      for (const id of choosable) isSelected ? next.add(id) : next.delete(id);
      selection?.onChange(next);
    },
  };
}
