import type { Fault } from '@/lib/errors';
import { bindColumns } from './columns';
import { parseCsv } from './csv';
import { foldHeading, splitHeading } from './headings';
import { type KindReader, kindReaders, sampleReader } from './kind-readers';
import type {
  ColumnReading,
  MapRecord,
  Note,
  ReadContext,
  ReadFailure,
  ReadResult,
  SampleRecord,
  UploadKind,
} from './kinds';
import { withoutLeftOut } from './leave-out';
import { isWideMap, WideMapReading } from './maps-wide';
import { TableReading } from './reading';
import { FaultReport, NoteReport } from './reports';
import { endingOf, promisesOtherFormat, refuseOtherFormats } from './signatures';
import type { RawTable } from './table';
import { refuseBrokenUtf8 } from './utf8';

/** Bytes to a plain table: the place where further containers will be told apart. */
function openContainer(
  bytes: Uint8Array,
  fileName: string,
  reader: { maxRows: number; what: string },
  faults: FaultReport,
  notes: NoteReport,
): RawTable | null {
  const refusal = refuseEmpty(bytes, reader.what) ?? refuseOtherFormats(bytes, fileName);
  const fault = refusal ?? refuseBrokenUtf8(bytes);
  if (fault !== null) {
    faults.add(fault);
    return null;
  }
  if (promisesOtherFormat(fileName)) {
    const message = `The name ends in .${endingOf(fileName)} and the content is CSV text; it is read as CSV`;
    notes.warn('name-mismatch', message);
  }
  return parseCsv(bytes, reader.maxRows, faults, notes);
}

function refuseEmpty(bytes: Uint8Array, what: string): Fault | null {
  const isOnlyMark = bytes.length === 3 && bytes[0] === 0xef && bytes[1] === 0xbb;
  if (bytes.length > 0 && !isOnlyMark) return null;
  const message = `the file is empty; expected a header line and at least one ${what}`;
  return { code: 'empty-file', message };
}

interface Rows<R> {
  records: R[];
  columns: ColumnReading[];
}

function readRows<R>(
  whole: RawTable,
  reader: KindReader<R>,
  context: ReadContext,
  faults: FaultReport,
  notes: NoteReport,
): Rows<R> {
  const table = withoutLeftOut(whole, context);
  const binding = bindColumns(table, reader.columns(context), context.columnMap, faults, notes);
  const { columns, readings } = binding;
  if (!binding.isReadable) {
    suggestKind(table, context.kind, notes);
    return { records: [], columns: readings };
  }
  if (table.rowCount === 0 && !reader.mayBeEmpty && faults.count === 0) {
    faults.add({
      code: 'no-rows',
      ...table.headingPlace,
      found: 'a header line and no rows',
      expected: `at least one ${reader.what}`,
    });
    return { records: [], columns: readings };
  }
  const reading = new TableReading(table, columns, faults, notes);
  return { records: reader.read(reading, context), columns: readings };
}

/** Where the headings fit another kind, the wrong kind was probably chosen. */
function suggestKind(table: RawTable, chosen: UploadKind, notes: NoteReport): void {
  const headings = new Set(
    table.columns.map(({ heading }) => foldHeading(splitHeading(heading).name)),
  );
  for (const kind of Object.keys(kindReaders) as UploadKind[]) {
    const { specs } = kindReaders[kind].columns({ fileName: '', kind });
    const needed = specs.filter((spec) => spec.required).map((spec) => spec.name);
    if (kind === chosen || !needed.every((name) => headings.has(name))) continue;
    const message = `The columns look like ${kind.replace('-', ' ')}; was the kind chosen wrongly?`;
    notes.warn('kind-mismatch', message, table.headingPlace);
    return;
  }
}

function readMaps(
  table: RawTable,
  context: ReadContext,
  faults: FaultReport,
  notes: NoteReport,
): Rows<MapRecord> {
  const named = new Set(Object.values(context.columnMap ?? {}));
  if (named.has('completeness') || !isWideMap(table)) {
    return readRows(table, kindReaders['completeness-maps'], context, faults, notes);
  }
  const wide = new WideMapReading(table, context, faults, notes);
  return { records: wide.read(), columns: wide.readings };
}

function failure(
  context: ReadContext,
  columns: ColumnReading[],
  faults: FaultReport,
  notes: NoteReport,
): ReadFailure {
  return {
    ok: false,
    kind: context.kind,
    faults: faults.list(context.fileName),
    faultCount: faults.count,
    notes: notes.list(),
    columns,
  };
}

/**
 * Reads one uploaded file: container by its first bytes, plain table, records of the chosen kind.
 *
 * A pure function of the bytes and the context, both of which can be sent to a worker. Nothing
 * outside the bytes is read. Every default, conversion, ignored column and rounded value is a
 * note; faults say where they are, and with one fault no record is given.
 */
export function readUpload(bytes: Uint8Array, context: ReadContext): ReadResult {
  const faults = new FaultReport();
  const notes = new NoteReport();
  const { kind } = context;
  const reader = kindReaders[kind];
  const table = openContainer(bytes, context.fileName, reader, faults, notes);
  if (table === null) return failure(context, [], faults, notes);
  const { records, columns } =
    kind === 'completeness-maps'
      ? readMaps(table, context, faults, notes)
      : readRows(table, reader as KindReader<unknown>, context, faults, notes);
  if (faults.count > 0) return failure(context, columns, faults, notes);
  const { rowCount } = table;
  // The reader was taken by this very kind, which the types cannot follow.
  return {
    ok: true,
    kind,
    container: 'csv',
    records,
    notes: notes.list(),
    columns,
    rowCount,
  } as ReadResult;
}

export type SamplesResult =
  | { ok: true; records: SampleRecord[]; notes: Note[]; columns: ColumnReading[]; rowCount: number }
  | ReadFailure;

/** Reads posterior draws of companions, an attachment to a file of companions. */
export function readCompanionSamples(
  bytes: Uint8Array,
  context: Omit<ReadContext, 'kind'>,
): SamplesResult {
  const faults = new FaultReport();
  const notes = new NoteReport();
  const asCompanions: ReadContext = { ...context, kind: 'companions' };
  const table = openContainer(bytes, context.fileName, sampleReader, faults, notes);
  if (table === null) return failure(asCompanions, [], faults, notes);
  const { records, columns } = readRows(table, sampleReader, asCompanions, faults, notes);
  if (faults.count > 0) return failure(asCompanions, columns, faults, notes);
  return { ok: true, records, notes: notes.list(), columns, rowCount: table.rowCount };
}
