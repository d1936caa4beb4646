import {
  isArray,
  isObject,
  JsonNumber,
  type JsonObject,
  type JsonValue,
  kindOf,
} from './json-text';
import { uploadLimits } from './limits';
import { type FaultReport, quoteFound } from './reports';
import type { RawCell, RawTable } from './table';

/**
 * A list of objects as a plain table: a column a key, in the order of first appearance.
 *
 * Numbers stay the text that the file writes, so that an identifier keeps every digit.
 */
export function tableOfJson(
  value: JsonValue,
  {
    what,
    maxRows,
    isKnownHeading,
    headings = [],
    faults,
  }: {
    what: string;
    maxRows: number;
    isKnownHeading(heading: string): boolean;
    /** Columns that are there even where no row has them. */
    headings?: readonly string[];
    faults: FaultReport;
  },
): RawTable | null {
  if (!isArray(value)) {
    const expected = `a list of ${what}s`;
    faults.add({ code: 'schema', item: 'top level', found: kindOf(value), expected });
    return null;
  }
  if (value.items.length > maxRows) {
    const found = `${value.items.length} items`;
    faults.add({ code: 'too-many', found, expected: `at most ${maxRows} in one file` });
    return null;
  }
  const objects: JsonObject[] = [];
  value.items.forEach((item, i) => {
    if (isObject(item)) objects.push(item);
    else {
      const place = { item: `item ${i + 1}` };
      faults.add({ code: 'schema', ...place, found: kindOf(item), expected: `one ${what}` });
    }
  });
  const index = new Map(headings.map((heading, i) => [heading, i]));
  const firstItem = headings.map(() => 1);
  objects.forEach(({ keys }, row) => {
    for (const key of keys) {
      if (index.has(key)) continue;
      index.set(key, index.size);
      firstItem.push(row + 1);
    }
  });
  if (index.size > uploadLimits.tableColumns) {
    const found = `${index.size} keys`;
    faults.add({ code: 'too-many', found, expected: `at most ${uploadLimits.tableColumns}` });
    return null;
  }
  const columns = [...index.keys()].map((heading) => ({
    heading,
    unit: null,
    cells: new Array<RawCell>(objects.length).fill(null),
  }));
  objects.forEach(({ keys, values }, row) => {
    keys.forEach((key, i) => {
      const cell = cellOf(values[i]);
      if (cell === undefined && isKnownHeading(key)) {
        faults.add({
          code: 'schema',
          item: `item ${row + 1}`,
          column: key,
          found: kindOf(values[i]),
          expected: 'a text, a number, true, false or null',
        });
      } else columns[index.get(key) as number].cells[row] = cell ?? null;
    });
  });
  return {
    columns,
    rowCount: objects.length,
    headingPlace: {},
    rowPlace: (row) => ({ line: objects[row].line, item: `item ${row + 1}` }),
    unknownColumn: (column) => ({
      code: 'key-ignored',
      place: { item: `item ${firstItem[column]}, ${quoteFound(columns[column].heading)}` },
    }),
  };
}

function cellOf(value: JsonValue): RawCell | undefined {
  if (value instanceof JsonNumber) return value.text;
  if (isArray(value) || isObject(value)) return undefined;
  return value;
}
