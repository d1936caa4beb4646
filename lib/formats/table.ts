/** One cell as its container stores it; text containers give strings, binary ones typed values. */
export type RawCell = string | number | bigint | boolean | null;

export interface RawColumn {
  /** The heading as the file writes it, a unit in brackets included. */
  heading: string;
  /** The unit that the file's own metadata states, where the container has such metadata. */
  unit: string | null;
  cells: RawCell[];
}

/** Where something stands in a file, in the words of its container. */
export interface Place {
  line?: number;
  row?: number;
  column?: string;
  item?: string;
}

/**
 * The plain table between a container and the reader of a kind. A new container (ECSV, VOTable,
 * FITS, JSON) is one file that makes this; the readers of kinds do not know which one made it.
 */
export interface RawTable {
  columns: RawColumn[];
  rowCount: number;
  /** Where the headings stand. */
  headingPlace: Place;
  /** Where a row stands; rows count from 0. */
  rowPlace(row: number): Place;
  /** Free text that a spreadsheet would run carries a leading ' in this container. */
  hasFormulaGuards?: boolean;
  /** How a column that no kind knows is told, where not as a heading. */
  unknownColumn?(index: number): { code: string; place: Place };
}
