import type { ReactNode } from 'react';

export type CellValue = string | number | null;

/** One column of a DataTable: what it sorts and writes by, and what it shows. */
export interface DataColumn<Row> {
  id: string;
  /** The seen head. */
  head: ReactNode;
  /** The head in words, with the unit: for readers, for the file. */
  name: string;
  /** Null sorts last whatever the direction, and is an empty cell of the file. */
  value(row: Row): CellValue;
  /** What is seen, where the value alone is not enough. */
  cell?(row: Row): ReactNode;
  /** More columns of the file that this one stands for, such as the error of a value. */
  also?: { name: string; value(row: Row): CellValue }[];
  isNumeric?: boolean;
  isRowHead?: boolean;
  /** Columns of drawings have no order. */
  isUnsorted?: boolean;
  /** Not in the file: drawings and verbs. */
  isUnwritten?: boolean;
  /** For columns that narrow screens leave out. */
  className?: string;
  /** Its place in the last line. */
  total?: ReactNode;
}

/** A choice that keeps some rows. */
export interface Facet<Row> {
  id: string;
  label: string;
  /** Keeps every row. */
  any: string;
  options: { value: string; label: string }[];
  keeps(row: Row, value: string): boolean;
}

/** What narrows and orders a table; in the address, so that a link shows the same rows. */
export interface TableView {
  words: string;
  /** Column, and "desc" or "asc"; null keeps the order that the rows came in. */
  sort: { id: string; isDescending: boolean } | null;
  facets: Readonly<Record<string, string>>;
}

export const fold = (text: string) => text.toLowerCase().replace(/\s+/g, '');
