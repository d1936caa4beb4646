import { foldHeading, splitHeading } from './headings';
import type { ReadContext } from './kinds';
import { foldName } from './names';
import type { RawTable } from './table';

/**
 * The table without the rows of targets that the person leaves out; their faults then do not count.
 * Places of the rows that stay are those of the file.
 */
export function withoutLeftOut(table: RawTable, context: ReadContext): RawTable {
  if (!context.leaveOut || context.leaveOut.length === 0) return table;
  const wanted = context.kind === 'targets' ? 'name' : 'target';
  const named = table.columns.find(({ heading }) => {
    const { name } = splitHeading(heading);
    return foldHeading(context.columnMap?.[heading] ?? name) === wanted;
  });
  if (!named) return table;
  const left = new Set(context.leaveOut.map(foldName));
  const kept: number[] = [];
  named.cells.forEach((cell, row) => {
    if (!left.has(foldName(String(cell ?? '')))) kept.push(row);
  });
  if (kept.length === table.rowCount) return table;
  return {
    columns: table.columns.map((column) => ({
      ...column,
      cells: kept.map((row) => column.cells[row]),
    })),
    rowCount: kept.length,
    headingPlace: table.headingPlace,
    rowPlace: (row) => table.rowPlace(kept[row]),
    hasFormulaGuards: table.hasFormulaGuards,
  };
}
