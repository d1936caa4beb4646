'use client';

import {
  columnFilteringFeature,
  createFilteredRowModel,
  createSortedRowModel,
  globalFilteringFeature,
  type RowSelectionState,
  rowSelectionFeature,
  rowSortingFeature,
  tableFeatures,
  useTable,
} from '@tanstack/react-table';
import { useMemo } from 'react';
import type { CellValue, DataColumn, Facet, TableView } from './column';
import { fold } from './column';

export const features = tableFeatures({
  columnFilteringFeature,
  globalFilteringFeature,
  rowSortingFeature,
  rowSelectionFeature,
  filteredRowModel: createFilteredRowModel(),
  sortedRowModel: createSortedRowModel(),
});

/** "RB 9" before "RB 10", letters whatever their case. */
const order = new Intl.Collator('en-GB', { numeric: true, sensitivity: 'base' });

export function compareCells(a: CellValue | undefined, b: CellValue | undefined): number {
  if (typeof a === 'number' && typeof b === 'number') return a - b;
  return order.compare(String(a ?? ''), String(b ?? ''));
}

interface DataRows<Row> {
  rows: readonly Row[];
  columns: readonly DataColumn<Row>[];
  rowId(row: Row): string;
  /** What the words are looked for in; without it, all that the columns hold. */
  textOf?(row: Row): string;
  facets: readonly Facet<Row>[];
  view: TableView;
  onView(change: Partial<TableView>): void;
  selection?: { ids: ReadonlySet<string>; onChange(ids: Set<string>): void };
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

/** The table of the library over our columns: filter, order and selection live in its state. */
export function useDataRows<Row extends object>({
  rows,
  columns,
  rowId,
  textOf,
  facets,
  view,
  onView,
  selection,
}: DataRows<Row>) {
  const data = rows as Row[];
  const definitions = useMemo(
    () =>
      columns.map((column) => ({
        id: column.id,
        // The library puts undefined last in both directions, which null is not.
        accessorFn: (row: Row) => column.value(row) ?? undefined,
        enableSorting: !column.isUnsorted,
        sortUndefined: 'last' as const,
        sortDescFirst: column.isNumeric ?? false,
        sortFn: (
          a: { getValue(id: string): unknown },
          b: { getValue(id: string): unknown },
          id: string,
        ) => compareCells(a.getValue(id) as CellValue, b.getValue(id) as CellValue),
      })),
    [columns],
  );
  const wordsOf = useMemo(
    () => textOf ?? ((row: Row) => columns.map(({ value }) => value(row) ?? '').join(' ')),
    [textOf, columns],
  );
  const chosen = selection?.ids;
  const rowSelection = useMemo(
    (): RowSelectionState => Object.fromEntries([...(chosen ?? [])].map((id) => [id, true])),
    [chosen],
  );
  const sorting = useMemo(
    () => (view.sort === null ? [] : [{ id: view.sort.id, desc: view.sort.isDescending }]),
    [view.sort],
  );
  return useTable({
    features,
    data,
    columns: definitions,
    getRowId: rowId,
    state: { sorting, rowSelection, globalFilter: view },
    enableMultiSort: false,
    // One call a row is enough: the first column answers for all of them.
    getColumnCanGlobalFilter: (column) => column.id === columns[0]?.id,
    globalFilterFn: (row, _id, asked: TableView) => keepsRow(row.original, asked, facets, wordsOf),
    onSortingChange: (change) => {
      const [next] = typeof change === 'function' ? change(sorting) : change;
      onView({ sort: next ? { id: next.id, isDescending: next.desc } : null });
    },
    onRowSelectionChange: (change) => {
      const next = typeof change === 'function' ? change(rowSelection) : change;
      selection?.onChange(new Set(Object.keys(next).filter((id) => next[id])));
    },
  });
}
