import { LineCounter, parseDocument, type YAMLError } from 'yaml';
import { readDelimited } from './csv';
import { isLineEnd } from './csv-layout';
import { uploadLimits } from './limits';
import { type FaultReport, type NoteReport, quoteFound } from './reports';
import type { RawCell, RawTable } from './table';

const datatypes = /^(bool|u?int(8|16|32|64)|float(16|32|64|128)|complex(64|128|256)|string)$/;
const numeric = /^(u?int|float)/;
const versions = ['0.9', '1.0'];

interface HeaderColumn {
  name: string;
  datatype: string;
  unit: string | null;
}

interface Header {
  columns: HeaderColumn[];
  delimiter: ',' | ' ';
}

/** The YAML text in the `# ` lines, and where the table below them starts. */
function splitHeader(bytes: Uint8Array): { yaml: string; start: number; line: number } | null {
  const lines: string[] = [];
  let at = 0;
  let line = 1;
  while (bytes[at] === 35) {
    let end = at;
    while (end < bytes.length && !isLineEnd(bytes[end])) end += 1;
    if (line > 1)
      lines.push(
        Buffer.from(bytes.subarray(at + 1, end))
          .toString('utf8')
          .slice(1),
      );
    at = bytes[end] === 13 && bytes[end + 1] === 10 ? end + 2 : end + 1;
    line += 1;
    if (at > uploadLimits.ecsvHeaderBytes) return null;
  }
  return { yaml: lines.join('\n'), start: at, line };
}

/** Lines of the YAML text are one less than those of the file, whose first names the format. */
const lineInFile = (line: number) => line + 1;

function explainYaml(error: YAMLError): string {
  const [first] = error.message.split(/\bat line\b|:\n/);
  return first.trim();
}

function readHeader(yaml: string, faults: FaultReport, notes: NoteReport): Header | null {
  const lines = new LineCounter();
  const document = parseDocument(yaml, { lineCounter: lines, logLevel: 'silent', version: '1.2' });
  const [error] = document.errors;
  if (error) {
    const line = lineInFile(lines.linePos(error.pos[0]).line);
    const message = `the header is not valid YAML: ${explainYaml(error)}`;
    faults.add({ code: 'yaml-invalid', line, message });
    return null;
  }
  const alias = /(?:^|[\s[{,:-])\*\w/m.exec(yaml);
  if (alias && holdsAlias(document)) {
    const before = yaml.slice(0, alias.index + 1).split('\n').length;
    const message = 'the header uses YAML aliases, which are not accepted';
    faults.add({ code: 'yaml-alias', line: lineInFile(before), message });
    return null;
  }
  if (document.warnings.length > 0) {
    const count = document.warnings.length;
    const message = `${count} unknown YAML tag${count === 1 ? ' is' : 's are'} kept as text and never run`;
    notes.inform('yaml-tag', message);
  }
  return checkHeader(document.toJS({ maxAliasCount: 0 }), yaml, faults);
}

function holdsAlias(document: ReturnType<typeof parseDocument>): boolean {
  try {
    document.toJS({ maxAliasCount: 0 });
    return false;
  } catch (error) {
    if (error instanceof ReferenceError) return true;
    throw error;
  }
}

function checkHeader(content: unknown, yaml: string, faults: FaultReport): Header | null {
  const { datatype, delimiter = ' ' } = (content ?? {}) as {
    datatype?: unknown;
    delimiter?: unknown;
  };
  if (!Array.isArray(datatype) || datatype.length === 0) {
    faults.add({
      code: 'ecsv-header',
      line: 2,
      found: 'no list "datatype"',
      expected: 'the columns of the table under "datatype"',
    });
    return null;
  }
  if (delimiter !== ',' && delimiter !== ' ') {
    faults.add({
      code: 'ecsv-header',
      line: lineOf(yaml, /^delimiter/m),
      found: `the delimiter ${quoteFound(String(delimiter))}`,
      expected: 'a space or a comma',
    });
    return null;
  }
  const columns: HeaderColumn[] = [];
  datatype.forEach((entry: { name?: unknown; datatype?: unknown; unit?: unknown } | null, i) => {
    const line = lineOf(yaml, /^\s*- /gm, i);
    const type = String(entry?.datatype ?? '');
    if (typeof entry?.name !== 'string' && typeof entry?.name !== 'number') {
      const expected = 'the name of a column';
      faults.add({ code: 'ecsv-header', line, found: `no name in column ${i + 1}`, expected });
    } else if (!datatypes.test(type)) {
      faults.add({
        code: 'ecsv-datatype',
        line,
        found: `the datatype ${quoteFound(type)}`,
        expected:
          'bool, int8 to int64, uint8 to uint64, float16 to float128, complex64 to complex256 or string',
      });
    } else {
      const unit = entry.unit === undefined || entry.unit === null ? null : String(entry.unit);
      columns.push({ name: String(entry.name), datatype: type, unit });
    }
  });
  return faults.count > 0 ? null : { columns, delimiter };
}

/** Line in the file of the match with that number. */
function lineOf(yaml: string, pattern: RegExp, number = 0): number {
  const starts = [...yaml.matchAll(new RegExp(pattern, 'gm'))];
  const at = starts[number]?.index ?? 0;
  return lineInFile(yaml.slice(0, at).split('\n').length);
}

/**
 * Reads an ECSV table (0.9 and 1.0): the YAML header gives names, units and datatypes, the rows are
 * comma or space separated. Tags are never run, aliases are refused.
 */
export function parseEcsv(
  bytes: Uint8Array,
  maxRows: number,
  faults: FaultReport,
  notes: NoteReport,
): RawTable | null {
  const first = Buffer.from(bytes.subarray(0, 80))
    .toString('latin1')
    .split(/[\r\n]/)[0];
  const version = /^# %ECSV (\S+)/.exec(first)?.[1] ?? '';
  if (!versions.includes(version)) {
    const found = `ECSV version ${version || 'unnamed'}`;
    faults.add({ code: 'version', line: 1, found, expected: '0.9 or 1.0' });
    return null;
  }
  const split = splitHeader(bytes);
  if (split === null) {
    const most = uploadLimits.ecsvHeaderBytes / 1024;
    faults.add({ code: 'too-large', message: `the header is longer than ${most} KiB` });
    return null;
  }
  const header = readHeader(split.yaml, faults, notes);
  if (header === null) return null;
  const table = readDelimited(
    bytes,
    { ...split, delimiter: header.delimiter, commentLines: 0, hasMark: false },
    maxRows,
    faults,
  );
  return table && applyHeader(table, header, faults);
}

function applyHeader(table: RawTable, header: Header, faults: FaultReport): RawTable | null {
  const { line } = table.headingPlace;
  const names = header.columns.map(({ name }) => name);
  const odd = table.columns.findIndex(({ heading }, i) => heading !== names[i]);
  if (odd >= 0 || table.columns.length !== names.length) {
    const i = odd >= 0 ? odd : Math.min(table.columns.length, names.length);
    const here = table.columns[i] ? quoteFound(table.columns[i].heading) : 'missing';
    const there = names[i] === undefined ? 'missing' : quoteFound(names[i]);
    faults.add({
      code: 'ecsv-header',
      line,
      message: `column ${i + 1} is ${here} on line ${line} and ${there} in the header; expected the same names in the same order`,
    });
    return null;
  }
  table.columns.forEach((column, i) => {
    const { datatype, unit } = header.columns[i];
    column.unit = numeric.test(datatype) ? unit : null;
    if (datatype === 'bool') column.cells = readBooleans(table, i, faults);
  });
  return table;
}

function readBooleans(table: RawTable, index: number, faults: FaultReport): RawCell[] {
  const { heading, cells } = table.columns[index];
  return cells.map((cell, row) => {
    if (cell === 'True') return true;
    if (cell === 'False') return false;
    if (cell === '') return null;
    faults.add({
      code: 'not-a-boolean',
      ...table.rowPlace(row),
      column: heading,
      found: quoteFound(String(cell)),
      expected: 'True or False, as ECSV asks',
    });
    return null;
  });
}
