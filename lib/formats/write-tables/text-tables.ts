import { numberText, writeCsv } from '../write-csv';
import {
  areWholeNumbers,
  plainCell,
  rowCount,
  unitIn,
  type WrittenCell,
  type WrittenColumn,
  type WrittenTable,
} from './written-table';

/** Booleans as Python writes them, which ECSV asks for and CSV readers take. */
const asText = (cell: WrittenCell) =>
  typeof cell === 'boolean' ? (cell ? 'True' : 'False') : plainCell(cell);

const inWords = ({ columns }: WrittenTable) =>
  columns.map(({ name, values }) => ({ name, values: values.map(asText) }));

/** CSV: columns and nothing else; what they mean is in every other container. */
export function writeCsvTable(table: WrittenTable): string {
  rowCount(table);
  return writeCsv(inWords(table));
}

/** A YAML string in double quotes, with nothing in it that some reader takes for a line end. */
export function yamlText(text: string): string {
  return JSON.stringify(text).replace(
    /[\u007f-\u009f\u2028\u2029\ufeff\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g,
    (sign) => `\\u${sign.charCodeAt(0).toString(16).padStart(4, '0')}`,
  );
}

function ecsvType({ type, values }: WrittenColumn): string {
  if (type === 'number') return 'float64';
  if (type === 'boolean') return 'bool';
  if (type === 'integer' || (type === 'identifier' && areWholeNumbers(values))) return 'int64';
  return 'string';
}

/**
 * ECSV 1.0 with commas: names, units, types and provenance in the header, rows as in CSV.
 *
 * @see https://github.com/astropy/astropy-APEs/blob/main/APE6.rst
 */
export function writeEcsvTable(table: WrittenTable): string {
  rowCount(table);
  const columns = table.columns.map((column) => {
    const unit = unitIn(column, 'ecsv');
    const parts = [
      `name: ${yamlText(column.name)}`,
      ...(unit === null ? [] : [`unit: ${yamlText(unit)}`]),
      `datatype: ${ecsvType(column)}`,
      `description: ${yamlText(column.description)}`,
    ];
    return `- {${parts.join(', ')}}`;
  });
  const meta = [['title', table.title] as const, ...table.provenance];
  const header = [
    '%ECSV 1.0',
    '---',
    "delimiter: ','",
    'datatype:',
    ...columns,
    'meta:',
    ...meta.map(([name, text]) => `  ${yamlText(name)}: ${yamlText(text)}`),
    'schema: astropy-2.0',
  ];
  // Free text is no formula here: spreadsheets do not open ECSV.
  const rows = writeCsv(inWords(table), { guardsFormulas: false });
  return `${header.map((line) => `# ${line}`).join('\n')}\n${rows}`;
}

function jsonCell(cell: WrittenCell): string {
  const plain = plainCell(cell);
  return typeof plain === 'number' ? numberText(plain) : JSON.stringify(plain);
}

/** JSON: provenance, columns with their units, and one object a row; identifiers stay text. */
export function writeJsonTable(table: WrittenTable): string {
  const length = rowCount(table);
  const rows = Array.from({ length }, (_, row) => {
    const cells = table.columns.map(
      ({ name, values }) => `${JSON.stringify(name)}: ${jsonCell(values[row])}`,
    );
    return `  {${cells.join(', ')}}`;
  });
  const columns = table.columns.map((column) => {
    const { name, type, description } = column;
    return `  ${JSON.stringify({ name, type, unit: unitIn(column, 'hdf5'), description })}`;
  });
  const provenance = table.provenance.map(
    ([name, text]) => `  ${JSON.stringify(name)}: ${JSON.stringify(text)}`,
  );
  return [
    '{',
    ` "title": ${JSON.stringify(table.title)},`,
    ' "provenance": {',
    provenance.join(',\n'),
    ' },',
    ' "columns": [',
    columns.join(',\n'),
    ' ],',
    ' "rows": [',
    ...(rows.length > 0 ? [rows.join(',\n')] : []),
    ' ]',
    '}\n',
  ].join('\n');
}
