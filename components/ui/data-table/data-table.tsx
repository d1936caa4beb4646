'use client';

import {
  lazy,
  type ReactNode,
  Suspense,
  startTransition,
  useEffect,
  useRef,
  useState,
} from 'react';
import { saveFile } from '@/components/charts/save-file';
import { Cell, Row, TableBody, TableHead } from '../table';
import type { DataColumn, Facet } from './column';
import { FilterBar } from './filter-bar';
import { allRows, firstRows, MANY, type RowWindow } from './row-window';
import { rowsCsv } from './rows-csv';
import { SelectBox, SelectHead } from './select-box';
import { SortHead } from './sort-head';
import { TableScroll } from './table-scroll';
import { nextSort, type TableSelection, useDataRows } from './use-data-rows';
import { useTableView } from './use-table-view';

/** Only a table of many rows needs to know which of them are in sight. */
const RowsInSight = lazy(async () => ({ default: (await import('./rows-in-sight')).RowsInSight }));

interface DataTableProps<R extends object> {
  caption: string;
  rows: readonly R[];
  columns: readonly DataColumn<R>[];
  rowId(row: R): string;
  /** "target", "targets": for the count. */
  noun: { one: string; many: string };
  /** Left out, there is no field for words. */
  searchLabel?: string;
  textOf?(row: R): string;
  facets?: readonly Facet<R>[];
  /** Said beside the count while the rows stand as they came: "by right ascension". */
  givenOrder?: string;
  /** Without its ending; left out, there is no file. */
  fileName?: string;
  selection?: TableSelection<R>;
  /** The row whose details stand beside the table. */
  currentId?: string | null;
  onRowClick?(row: R): void;
  /** The last line holds the columns' totals. */
  hasTotal?: boolean;
  /** Two tables on a page cannot both keep their view in the address. */
  isInAddress?: boolean;
  /** Above the table, such as what can be done with the selected ones. */
  tools?: ReactNode;
}

const none: readonly Facet<never>[] = [];

function countWords(shown: number, all: number, { one, many }: { one: string; many: string }) {
  if (shown === all) return `${all} ${all === 1 ? one : many}`;
  return `${shown} of ${all} ${many}`;
}

/**
 * Rows that can be ordered, narrowed, selected and taken along as a file; the view stands in the
 * address. From a hundred rows on only those in sight are drawn, under a head that stays.
 */
export function DataTable<R extends object>(props: DataTableProps<R>) {
  const { columns, noun, facets = none as readonly Facet<R>[], selection } = props;
  const [view, onView] = useTableView(
    facets.map(({ id }) => id),
    props.isInAddress ?? true,
  );
  const { shown, selected, ...boxes } = useDataRows({ ...props, facets, view });
  const scroller = useRef<HTMLDivElement>(null);
  const isVirtual = shown.length >= MANY;
  // The server draws the first screen alone: the page is sooner there, and the rest follows at once.
  const [hasRest, setHasRest] = useState(false);
  useEffect(() => startTransition(() => setHasRest(true)), []);
  const isSelecting = selection !== undefined;
  const width = columns.length + (isSelecting ? 1 : 0);
  const chosen = selection?.ids.size ?? 0;
  const hasOrder = view.sort === null && props.givenOrder !== undefined;
  const hasBar =
    props.searchLabel !== undefined || facets.length > 0 || props.fileName !== undefined;
  const count = [
    ...(hasOrder ? [`${props.givenOrder}; `] : []),
    countWords(shown.length, props.rows.length, noun),
    ...(isSelecting ? [`, ${chosen} selected`] : []),
  ].join('');
  const csv = () => saveFile(`${props.fileName}.csv`, rowsCsv(shown, columns), 'text/csv');
  const draw = (window: RowWindow) => (
    <>
      {window.before > 0 && <Gap height={window.before} width={width} />}
      {window.indices.map((index) => {
        const row = shown[index];
        const id = props.rowId(row);
        return (
          <Row
            key={id}
            ref={window.measure}
            data-index={index}
            aria-rowindex={isVirtual ? index + 2 : undefined}
            isSelected={id === props.currentId || selected.has(id)}
            className={props.onRowClick ? 'cursor-pointer' : ''}
            onClick={props.onRowClick && (() => props.onRowClick?.(row))}
          >
            {selection && (
              <SelectBox
                label={selection.label(row)}
                isChecked={selected.has(id)}
                isDisabled={selection.canSelect?.(row) === false}
                onToggle={(isRange) => boxes.toggle(id, isRange)}
              />
            )}
            {columns.map((column) => (
              <Cell
                key={column.id}
                isNumeric={column.isNumeric}
                isRowHead={column.isRowHead}
                className={column.className}
              >
                {column.cell ? column.cell(row) : (column.value(row) ?? '–')}
              </Cell>
            ))}
          </Row>
        );
      })}
      {window.after > 0 && <Gap height={window.after} width={width} />}
    </>
  );
  return (
    <div className="min-w-0">
      {hasBar && (
        <FilterBar
          searchLabel={props.searchLabel}
          facets={facets}
          view={view}
          onView={onView}
          count={count}
          onCsv={props.fileName === undefined ? undefined : csv}
        />
      )}
      {props.tools}
      <TableScroll
        caption={props.caption}
        isVirtual={isVirtual}
        scroller={scroller}
        rowCount={isVirtual ? shown.length + 1 : undefined}
      >
        <TableHead>
          <tr aria-rowindex={isVirtual ? 1 : undefined}>
            {isSelecting && <SelectHead {...boxes} many={noun.many} />}
            {columns.map((column) => (
              <SortHead
                key={column.id}
                name={column.name}
                isNumeric={column.isNumeric ?? false}
                className={column.className ?? ''}
                direction={view.sort?.id === column.id && (view.sort.isDescending ? 'desc' : 'asc')}
                onSort={
                  column.isUnsorted
                    ? undefined
                    : () => onView({ sort: nextSort(column, view.sort) })
                }
              >
                {column.head}
              </SortHead>
            ))}
          </tr>
        </TableHead>
        <TableBody>
          {isVirtual ? (
            <Suspense fallback={draw(firstRows(shown.length))}>
              <RowsInSight count={shown.length} scroller={scroller} draw={draw} />
            </Suspense>
          ) : (
            draw(hasRest ? allRows(shown.length) : firstRows(shown.length))
          )}
          {shown.length === 0 && (
            <tr>
              <td colSpan={width} className="py-6 text-ink3">
                No {noun.one} fits.{' '}
                <button
                  type="button"
                  className="min-h-6 font-semibold text-act max-md:min-h-11"
                  onClick={() => onView({ words: '', facets: {} })}
                >
                  Show all {props.rows.length}
                </button>
              </td>
            </tr>
          )}
          {props.hasTotal && (
            <Row isTotal>
              {isSelecting && <Cell />}
              {columns.map((column) => (
                <Cell
                  key={column.id}
                  isNumeric={column.isNumeric}
                  isRowHead={column.isRowHead}
                  className={column.className}
                >
                  {column.total}
                </Cell>
              ))}
            </Row>
          )}
        </TableBody>
      </TableScroll>
    </div>
  );
}

/** Keeps the place of rows that are not drawn. */
function Gap({ height, width }: { height: number; width: number }) {
  return (
    <tr>
      <td colSpan={width} style={{ height, padding: 0 }} />
    </tr>
  );
}
