import { SaxesParser, type SaxesTagPlain } from 'saxes';
import { uploadLimits } from './limits';
import { type FaultReport, type NoteReport, quoteFound } from './reports';
import type { RawCell, RawColumn, RawTable } from './table';
import {
  fieldOf,
  isKnownDatatype,
  readBinaryRows,
  readTextCell,
  VOTABLE_DATATYPES,
  type VotableField,
} from './votable-cells';

const deepest = 32;

/** Ends the parse from within; what is wrong has been reported. */
class StopReading extends Error {}

interface Table {
  name: string;
  fields: VotableField[];
  rows: { line: number; cells: RawCell[] }[];
  headingLine: number;
  encoding: 'TABLEDATA' | 'BINARY' | 'BINARY2' | null;
  stream: string[];
  streamLine: number;
}

/** Gathers the tables of a VOTable while its text goes by. */
class VotableCollector {
  readonly tables: Table[] = [];
  private readonly parser = new SaxesParser({ xmlns: false, position: true });
  /** The outermost element, judged when the text was read: worse may come first. */
  root: { name: string; line: number } | null = null;
  private depth = 0;
  private text = '';
  private takesText = false;
  private row: { line: number; cells: string[] } | null = null;
  private status: { line: number; text: string } | null = null;
  private path: string[] = [];

  constructor(
    private readonly faults: FaultReport,
    private readonly maxRows: number,
  ) {
    const { parser } = this;
    parser.on('doctype', () => this.refuseDoctype());
    parser.on('error', (error) => this.refuseXml(error.message));
    parser.on('opentag', (tag) => this.open(tag));
    parser.on('text', (text) => {
      if (this.takesText) this.text += text;
    });
    parser.on('cdata', (text) => {
      if (this.takesText) this.text += text;
    });
    parser.on('closetag', ({ name }) => this.close(local(name)));
  }

  read(text: string): void {
    this.parser.write(text).close();
  }

  private stop(fault: Parameters<FaultReport['add']>[0]): never {
    this.faults.add(fault);
    throw new StopReading();
  }

  private refuseDoctype(): never {
    return this.stop({
      code: 'doctype-refused',
      line: this.parser.line,
      found: 'a DOCTYPE',
      expected: 'a VOTable without one',
      hint: 'Nothing outside the file is read',
    });
  }

  private refuseXml(message: string): never {
    const { line } = this.parser;
    const entity = /undefined entity|entity/i.test(message);
    const said = message.replace(/^\d+:\d+: /, '').replace(/\.$/, '');
    return this.stop({
      code: 'xml-invalid',
      line,
      message: entity
        ? `found an entity that is not defined; expected one of &amp; &lt; &gt; &quot; &apos; or a numeric one`
        : `the XML is not well formed: ${said}`,
    });
  }

  private get table(): Table | undefined {
    return this.tables[this.tables.length - 1];
  }

  private open(tag: SaxesTagPlain): void {
    this.depth += 1;
    if (this.depth > deepest) {
      this.stop({ code: 'too-deep', line: 1, found: `elements nested more than ${deepest} deep` });
    }
    const name = local(tag.name);
    this.path.push(name);
    const { attributes } = tag;
    if (this.depth === 1) this.root = { name, line: this.parser.line };
    switch (name) {
      case 'INFO':
        if (attributes.name === 'QUERY_STATUS' && attributes.value === 'ERROR') {
          this.status = { line: this.parser.line, text: '' };
          this.takeText();
        }
        break;
      case 'TABLE':
        this.tables.push({
          name: attributes.name ?? attributes.ID ?? String(this.tables.length + 1),
          fields: [],
          rows: [],
          headingLine: this.parser.line,
          encoding: null,
          stream: [],
          streamLine: 0,
        });
        break;
      case 'FIELD':
        this.openField(attributes);
        break;
      case 'VALUES':
        if (this.path[this.path.length - 2] === 'FIELD' && this.table) {
          const { fields } = this.table;
          if (attributes.null !== undefined) fields[fields.length - 1].nullText = attributes.null;
        }
        break;
      case 'TABLEDATA':
      case 'BINARY':
      case 'BINARY2':
        if (this.table) this.table.encoding = name;
        break;
      case 'FITS':
        this.stop({
          code: 'container-unsupported',
          line: this.parser.line,
          found: 'a VOTable around a FITS file',
          expected: 'TABLEDATA, BINARY or BINARY2',
        });
        break;
      case 'STREAM':
        this.openStream(attributes);
        break;
      case 'TR':
        this.row = { line: this.parser.line, cells: [] };
        break;
      case 'TD':
        this.takeText();
        break;
    }
  }

  private openField(attributes: Record<string, string>): void {
    const { table } = this;
    if (!table) return;
    table.headingLine = this.parser.line;
    const field = fieldOf(attributes, this.parser.line);
    if (!isKnownDatatype(field.datatype)) {
      this.faults.add({
        code: 'dtype-unsupported',
        line: this.parser.line,
        column: field.name,
        found: `the datatype ${quoteFound(field.datatype)}`,
        expected: VOTABLE_DATATYPES,
      });
    }
    table.fields.push(field);
  }

  private openStream(attributes: Record<string, string>): void {
    if (attributes.href !== undefined) {
      this.stop({
        code: 'external-refused',
        line: this.parser.line,
        found: `a stream at ${quoteFound(attributes.href)}`,
        expected: 'the data inside this file',
      });
    }
    if (this.table) this.table.streamLine = this.parser.line;
    this.takeText();
  }

  private takeText(): void {
    this.text = '';
    this.takesText = true;
  }

  private close(name: string): void {
    this.depth -= 1;
    this.path.pop();
    if (name === 'TD') this.row?.cells.push(this.text);
    if (name === 'TR') this.closeRow();
    if (name === 'STREAM') this.table?.stream.push(this.text);
    if (name === 'INFO' && this.status) {
      const { line } = this.status;
      const said = quoteFound(this.text.trim());
      this.stop({
        code: 'upstream-error',
        line,
        message: `the file reports a failed query: ${said}`,
      });
    }
    if (name === 'TD' || name === 'STREAM' || name === 'INFO') this.takesText = false;
  }

  private closeRow(): void {
    const { row, table } = this;
    this.row = null;
    if (!row || !table) return;
    const place = { line: row.line, row: table.rows.length + 1 };
    if (row.cells.length !== table.fields.length) {
      this.faults.add({
        code: 'row-length',
        ...place,
        found: `${row.cells.length} cells`,
        expected: `${table.fields.length}, as there are ${table.fields.length} FIELDs`,
      });
      return;
    }
    if (table.rows.length === this.maxRows) {
      this.stop({
        code: 'too-many',
        ...place,
        found: `more than ${this.maxRows} rows`,
        expected: `at most ${this.maxRows} in one file`,
      });
    }
    table.rows.push({
      line: row.line,
      cells: row.cells.map((text, i) => readTextCell(text, table.fields[i])),
    });
  }
}

const local = (name: string) => name.slice(name.indexOf(':') + 1);

/**
 * Reads a VOTable (1.1 to 1.5; TABLEDATA, BINARY, BINARY2) with one table into a plain table.
 *
 * No DTD, entity or address is followed. A FIELD's name wins over its ID.
 */
export function parseVotable(
  bytes: Uint8Array,
  maxRows: number,
  faults: FaultReport,
  notes: NoteReport,
): RawTable | null {
  const collector = new VotableCollector(faults, maxRows);
  try {
    collector.read(new TextDecoder('utf-8').decode(bytes));
  } catch (error) {
    if (!(error instanceof StopReading)) throw error;
    return null;
  }
  const { tables, root } = collector;
  if (root !== null && root.name !== 'VOTABLE') {
    const found = `an XML document <${root.name}>`;
    faults.add({ code: 'format-mismatch', line: root.line, found, expected: 'a VOTable' });
    return null;
  }
  if (tables.length === 0) {
    faults.add({ code: 'no-table', found: 'no TABLE', expected: 'one' });
    return null;
  }
  if (tables.length > 1) {
    const names = tables.slice(0, 10).map(({ name }) => quoteFound(name));
    const message = `found ${tables.length} tables (${names.join(', ')}); expected a file with one`;
    faults.add({ code: 'choose-table', message });
    return null;
  }
  if (faults.count > 0) return null;
  const [table] = tables;
  if (table.fields.length > uploadLimits.tableColumns) {
    const found = `${table.fields.length} columns`;
    faults.add({ code: 'too-many', found, expected: `at most ${uploadLimits.tableColumns}` });
    return null;
  }
  if (table.encoding === 'BINARY' || table.encoding === 'BINARY2') {
    const rows = readBinaryRows(table.stream.join(''), table.fields, {
      hasNullFlags: table.encoding === 'BINARY2',
      maxRows,
      line: table.streamLine,
      faults,
    });
    if (rows === null) return null;
    notes.inform('binary-table', `Read from ${table.encoding}: places are rows and not lines`);
    return asTable(table, rows, (row) => ({ row: row + 1 }));
  }
  const lines = table.rows.map(({ line }) => line);
  const rows = table.rows.map(({ cells }) => cells);
  return asTable(table, rows, (row) => ({ line: lines[row], row: row + 1 }));
}

function asTable(table: Table, rows: RawCell[][], rowPlace: RawTable['rowPlace']): RawTable {
  const columns = table.fields.map(
    ({ name, unit }, i): RawColumn => ({ heading: name, unit, cells: rows.map((row) => row[i]) }),
  );
  return { columns, rowCount: rows.length, headingPlace: { line: table.headingLine }, rowPlace };
}
