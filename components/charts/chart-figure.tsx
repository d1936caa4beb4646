'use client';

import { type ReactNode, type Ref, useRef, useState } from 'react';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import type { DataTable } from './data-table';
import { useFigureSettings } from './figure-context';
import { FigureMenu } from './figure-menu';

/** The numbers behind a chart, as they are read out. */
export interface ChartTable {
  caption: string;
  /** Heads with their units; all columns after the first hold numbers unless `isText` says so. */
  columns: string[];
  rows: string[][];
}

interface ChartFigureProps {
  /** A word or two for the names of files: "limit-map". */
  name: string;
  /** One sentence made from the data. */
  label: string;
  width: number;
  height: number;
  measure?: Ref<HTMLDivElement>;
  /** Made when it is first asked for. */
  tables(): ChartTable[];
  /** The same unrounded, for files; left out where the page brings them. */
  data?(): DataTable[];
  /** Marks of the drawing. */
  children: ReactNode;
  /** Controls over the drawing, in px of the drawing. */
  overlay?: ReactNode;
  /** Above the drawing, such as a choice of view. */
  header?: ReactNode;
  caption?: ReactNode;
  className?: string;
}

/** A drawing with its sentence for readers, and its numbers as a table beside it. */
export function ChartFigure(props: ChartFigureProps) {
  const { label, width, height, measure, tables, children, overlay, header, caption } = props;
  const settings = useFigureSettings();
  const figure = useRef<HTMLElement>(null);
  return (
    <figure ref={figure} className={`min-w-0 ${props.className ?? ''}`}>
      {header}
      <div ref={measure} className="relative">
        <svg
          className="chart"
          width="100%"
          height={height}
          viewBox={`0 0 ${width} ${height}`}
          preserveAspectRatio="xMinYMin meet"
          role="img"
          aria-label={label}
        >
          {children}
        </svg>
        {overlay}
      </div>
      <figcaption className="flex flex-wrap items-baseline justify-between gap-x-4 text-chart text-ink3">
        <span>{caption}</span>
        {settings && (
          <FigureMenu
            settings={settings}
            name={props.name}
            description={label}
            data={props.data}
            figure={figure}
          />
        )}
        <AsTable tables={tables} />
      </figcaption>
    </figure>
  );
}

/** "as table": closed at first; the rows are made when it opens. */
export function AsTable({ tables }: { tables(): ChartTable[] }) {
  const [isOpen, setOpen] = useState(false);
  return (
    <details
      className="min-w-0 open:w-full print:hidden"
      onToggle={(event) => setOpen(event.currentTarget.open)}
    >
      <summary className="ml-auto w-max list-none py-1 text-act marker:content-none max-md:py-3">
        as table
      </summary>
      {isOpen && <ChartTables tables={tables()} />}
    </details>
  );
}

/** The tables themselves, for screens that show them without asking. */
export function ChartTables({ tables }: { tables: ChartTable[] }) {
  return (
    <div className="grid max-h-96 gap-4 overflow-y-auto">
      {tables.map((table) => (
        <Table key={table.caption} caption={table.caption} isCaptionShown>
          <TableHead>
            <tr>
              {table.columns.map((column, index) => (
                <HeadCell key={column} isNumeric={index > 0}>
                  {column}
                </HeadCell>
              ))}
            </tr>
          </TableHead>
          <TableBody>
            {table.rows.map((row) => (
              <Row key={row.join('|')}>
                {row.map((cell, index) => (
                  <Cell key={table.columns[index]} isNumeric={index > 0} isRowHead={index === 0}>
                    {cell}
                  </Cell>
                ))}
              </Row>
            ))}
          </TableBody>
        </Table>
      ))}
    </div>
  );
}
