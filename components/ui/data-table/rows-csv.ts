import type { CellValue, DataColumn } from './column';

/** Text that a spreadsheet would run as a formula gets a leading apostrophe. */
const guarded = (text: string) => (/^'*[=+\-@\t\r]/.test(text) ? `'${text}` : text);

function written(value: CellValue): string {
  if (value === null) return '';
  const text = typeof value === 'number' ? String(value) : guarded(value);
  return /[",\r\n#]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/**
 * The rows in their shown order as CSV (RFC 4180 with LF), one header line, missing cells empty.
 *
 * @throws RangeError for an infinite number, which no reader would take
 */
export function rowsCsv<Row>(rows: readonly Row[], columns: readonly DataColumn<Row>[]): string {
  const fields = columns
    .filter(({ isUnwritten }) => !isUnwritten)
    .flatMap(({ name, value, also = [] }) => [{ name, value }, ...also]);
  const lines = rows.map((row) =>
    fields
      .map(({ name, value }) => {
        const cell = value(row);
        if (typeof cell === 'number' && !Number.isFinite(cell))
          throw new RangeError(`${name} must be finite, got ${cell}`);
        return written(cell);
      })
      .join(','),
  );
  return `${[fields.map(({ name }) => written(name)).join(','), ...lines].join('\n')}\n`;
}
