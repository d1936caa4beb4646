import { numberText } from '../write-csv';
import {
  areWholeNumbers,
  MISSING_INTEGER,
  plainCell,
  rowCount,
  unitIn,
  type WrittenCell,
  type WrittenColumn,
  type WrittenTable,
} from './written-table';

const escapes: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  // A reader makes a line feed of it otherwise.
  '\r': '&#13;',
};

/** Text as XML holds it; signs that XML 1.0 has no place for become U+FFFD. */
function xmlText(text: string): string {
  return text
    .replace(/[^\t\n\r\u0020-\ud7ff\ue000-\ufffd\u{10000}-\u{10ffff}]/gu, '\ufffd')
    .replace(/[&<>"\r]/g, (sign) => escapes[sign]);
}

/** In an attribute white space would become a plain space. */
const attribute = (text: string) =>
  xmlText(text).replace(/[\t\n]/g, (sign) => `&#${sign.charCodeAt(0)};`);

type Datatype = 'double' | 'long' | 'boolean' | 'unicodeChar';

function datatypeOf({ type, values }: WrittenColumn): Datatype {
  if (type === 'number') return 'double';
  if (type === 'boolean') return 'boolean';
  const isWhole = type === 'integer' || (type === 'identifier' && areWholeNumbers(values));
  return isWhole ? 'long' : 'unicodeChar';
}

/** Names of columns as XML identifiers, each once: clients name their columns by them. */
function identifiersOf(columns: readonly WrittenColumn[]): string[] {
  const taken = new Set<string>();
  return columns.map(({ name }) => {
    const plain = name.replace(/[^A-Za-z0-9_.-]/g, '_').replace(/^(?![A-Za-z_])/, '_');
    let identifier = plain;
    for (let i = 2; taken.has(identifier); i += 1) identifier = `${plain}_${i}`;
    taken.add(identifier);
    return identifier;
  });
}

function fieldLines(column: WrittenColumn, identifier: string, datatype: Datatype): string[] {
  const unit = unitIn(column, 'votable');
  const attributes = [
    `ID="${identifier}"`,
    `name="${attribute(column.name)}"`,
    `datatype="${datatype}"`,
    ...(datatype === 'unicodeChar' ? ['arraysize="*"'] : []),
    ...(unit === null ? [] : [`unit="${attribute(unit)}"`]),
    ...(column.ucd === undefined ? [] : [`ucd="${attribute(column.ucd)}"`]),
  ];
  return [
    `   <FIELD ${attributes.join(' ')}>`,
    `    <DESCRIPTION>${xmlText(column.description)}</DESCRIPTION>`,
    ...(datatype === 'long' ? [`    <VALUES null="${MISSING_INTEGER}"/>`] : []),
    '   </FIELD>',
  ];
}

function cellText(cell: WrittenCell, datatype: Datatype): string {
  const plain = plainCell(cell);
  if (plain === null) {
    return datatype === 'long' ? MISSING_INTEGER : datatype === 'boolean' ? '?' : '';
  }
  return typeof plain === 'number' ? numberText(plain) : xmlText(String(plain));
}

/**
 * VOTable 1.3 with its rows as text. Not 1.4: its grammar of units has no mass of Jupiter.
 *
 * @see https://www.ivoa.net/documents/VOTable/20130920/
 */
export function writeVotable(table: WrittenTable): string {
  const length = rowCount(table);
  const { columns, provenance } = table;
  const datatypes = columns.map(datatypeOf);
  const identifiers = identifiersOf(columns);
  const rows = Array.from({ length }, (_, row) => {
    const cells = columns.map(({ values }, i) => `<TD>${cellText(values[row], datatypes[i])}</TD>`);
    return `     <TR>${cells.join('')}</TR>`;
  });
  return [
    '<?xml version="1.0" encoding="UTF-8"?>',
    '<VOTABLE version="1.3" xmlns="http://www.ivoa.net/xml/VOTable/v1.3">',
    ' <RESOURCE type="results">',
    `  <DESCRIPTION>${xmlText(table.title)}</DESCRIPTION>`,
    ...provenance.map(
      ([name, text]) => `  <INFO name="${attribute(name)}" value="${attribute(text)}"/>`,
    ),
    `  <TABLE name="${attribute(table.name)}">`,
    ...columns.flatMap((column, i) => fieldLines(column, identifiers[i], datatypes[i])),
    '   <DATA>',
    '    <TABLEDATA>',
    ...rows,
    '    </TABLEDATA>',
    '   </DATA>',
    '  </TABLE>',
    ' </RESOURCE>',
    '</VOTABLE>\n',
  ].join('\n');
}
