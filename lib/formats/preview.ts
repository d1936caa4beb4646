import type { BoundColumn } from './columns';
import type { CurveRecord, MapRecord, Preview, PreviewCell, ReadContext } from './kinds';
import { readNumberText, readTypedNumber } from './numbers';
import type { RawCell, RawTable } from './table';

const shown = { rows: 8, characters: 120, curves: 5, points: 200, maps: 3, nodes: 40 };

/** A table with the columns that were found in it. */
export interface BoundTable {
  table: RawTable;
  columns: ReadonlyMap<string, BoundColumn>;
}

/**
 * What a person looks at before storing: the first rows in our columns and units, and the first
 * curves or maps, thinned to what a small drawing can show.
 */
export function previewOf(
  kind: ReadContext['kind'],
  records: unknown[],
  bound: BoundTable | null,
): Preview {
  // Rows of a long map say little; its drawing says all.
  const table = bound && kind !== 'completeness-maps' ? previewTable(bound) : null;
  return {
    table,
    curves:
      kind === 'contrast-curves'
        ? (records as CurveRecord[]).slice(0, shown.curves).map(thinCurve)
        : [],
    maps:
      kind === 'completeness-maps'
        ? (records as MapRecord[]).slice(0, shown.maps).map(thinMap)
        : [],
  };
}

function previewTable({ table, columns }: BoundTable): NonNullable<Preview['table']> {
  const bound = [...columns.values()];
  const rows = Array.from({ length: Math.min(shown.rows, table.rowCount) }, (_, row) =>
    bound.map((column) => readCell(column.raw.cells[row], column)),
  );
  return {
    columns: bound.map(({ name, ourUnit, unit }) => ({
      name,
      unit: unit === null ? null : ourUnit || null,
    })),
    rows,
  };
}

/** Of a long remark its beginning. */
const beginningOf = (text: string) =>
  text.length <= shown.characters
    ? text
    : `${[...text.slice(0, shown.characters)].slice(0, -1).join('')}…`;

function readCell(cell: RawCell, { unit, toOurUnit }: BoundColumn): PreviewCell {
  if (cell === null || cell === '') return null;
  if (unit === null) return beginningOf(String(cell));
  const reading =
    typeof cell === 'string' || typeof cell === 'boolean'
      ? readNumberText(String(cell), unit)
      : readTypedNumber(cell, unit);
  if (typeof reading !== 'number') return null;
  return toOurUnit === null ? reading : toOurUnit(reading);
}

/** Evenly spread positions of a list, its two ends among them. */
function spread(length: number, most: number): number[] {
  if (length <= most) return Array.from({ length }, (_, index) => index);
  return Array.from({ length: most }, (_, index) =>
    Math.round((index * (length - 1)) / (most - 1)),
  );
}

function thinCurve(record: CurveRecord): Preview['curves'][number] {
  const points = spread(record.separationArcsec.length, shown.points);
  return {
    target: record.target,
    band: record.band,
    epoch: record.epoch,
    nSigma: record.nSigma,
    separationArcsec: points.map((point) => record.separationArcsec[point]),
    contrastMag: points.map((point) => record.contrastMag[point]),
  };
}

const centresOf = (edges: number[]) =>
  edges.slice(1).map((upper, index) => Math.sqrt(edges[index] * upper));

function thinMap(record: MapRecord): Preview['maps'][number] {
  const isCells = record.nodeKind === 'cells';
  const masses = isCells ? centresOf(record.massMjup) : record.massMjup;
  const axes = isCells ? centresOf(record.semiMajorAxisAu) : record.semiMajorAxisAu;
  const [rows, columns] = [spread(masses.length, shown.nodes), spread(axes.length, shown.nodes)];
  return {
    target: record.target,
    massMjup: rows.map((row) => masses[row]),
    semiMajorAxisAu: columns.map((column) => axes[column]),
    // Four digits are more than a drawing shows.
    completeness: rows.flatMap((row) =>
      columns.map(
        (column) => Math.round(1e4 * record.completeness[row * axes.length + column]) / 1e4,
      ),
    ),
  };
}
