import { bindColumns, findSpec } from './columns';
import { excerptsOf, linesOf } from './excerpts';
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
import { uploadLimits } from './limits';
import { readMapCube } from './map-cube';
import { isWideMap, WideMapReading } from './maps-wide';
import { offendingRows } from './offending-rows';
import { type Opened, type OpenOptions, openContainer, openText } from './open-container';
import { type BoundTable, previewOf } from './preview';
import { TableReading } from './reading';
import { FaultReport, NoteReport } from './reports';
import type { RawTable } from './table';

interface Rows<R> {
  records: R[];
  columns: ColumnReading[];
  bound?: BoundTable;
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
  return {
    records: reader.read(reading, context),
    columns: readings,
    bound: { table, columns },
  };
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

/** What a refused reading has left for its faults to be shown with. */
interface Remains {
  text?: Uint8Array;
  table?: RawTable;
}

function failure(
  context: ReadContext,
  columns: ColumnReading[],
  faults: FaultReport,
  notes: NoteReport,
  { text, table }: Remains,
): ReadFailure {
  const textsOf = (lines: ReadonlySet<number>) =>
    text ? linesOf(text, lines, uploadLimits.cellCharacters) : new Map<number, string>();
  return {
    ok: false,
    kind: context.kind,
    faults: faults.list(context.fileName),
    faultCount: faults.count,
    notes: notes.list(),
    columns,
    excerpts: text ? excerptsOf(text, faults.list(context.fileName)) : [],
    offending: table ? offendingRows(table, faults.kept, textsOf) : null,
  };
}

/** Reports and limits of one reading. */
function optionsFor(
  context: ReadContext,
  reader: Pick<KindReader<unknown>, 'maxRows' | 'what' | 'columns'>,
): OpenOptions & { remains: Remains } {
  const { maxRows, what } = reader;
  const remains: Remains = {};
  const columns = reader.columns(context);
  return {
    context,
    maxRows,
    what,
    isKnownHeading: (heading) =>
      findSpec(splitHeading(heading).name, columns) !== null ||
      Object.hasOwn(context.columnMap ?? {}, heading),
    faults: new FaultReport(),
    notes: new NoteReport(),
    remains,
    onText: (bytes) => {
      remains.text = bytes;
    },
  };
}

function readOpened(
  opened: Opened | null,
  options: OpenOptions & { remains: Remains },
): ReadResult {
  const { context, faults, notes, remains } = options;
  const { kind } = context;
  if (opened === null) return failure(context, [], faults, notes, remains);
  const { records, columns, bound } = readRecords(opened, options);
  if ('table' in opened) remains.table = opened.table;
  if (faults.count > 0) return failure(context, columns, faults, notes, remains);
  // The reader was taken by this very kind, which the types cannot follow.
  return {
    ok: true,
    kind,
    container: opened.container,
    part: opened.part ?? null,
    preview: previewOf(kind, records, bound ?? null),
    records,
    notes: notes.list(),
    columns,
    rowCount: 'table' in opened ? opened.table.rowCount : records.length,
  } as ReadResult;
}

function readRecords(opened: Opened, { context, faults, notes }: OpenOptions): Rows<unknown> {
  const { kind } = context;
  if ('cube' in opened) {
    return { records: readMapCube(opened.cube, context, faults, notes), columns: [] };
  }
  if (kind === 'completeness-maps') return readMaps(opened.table, context, faults, notes);
  return readRows(opened.table, kindReaders[kind] as KindReader<unknown>, context, faults, notes);
}

/**
 * Reads one uploaded file: container by its first bytes, plain table or arrays, records of the
 * chosen kind.
 *
 * A pure function of the bytes and the context, both of which can be sent to a worker. Nothing
 * outside the bytes is read. Every default, conversion, ignored column and rounded value is a
 * note; faults say where they are, and with one fault no record is given.
 */
export async function readUploadedFile(
  bytes: Uint8Array,
  context: ReadContext,
): Promise<ReadResult> {
  const options = optionsFor(context, kindReaders[context.kind]);
  return readOpened(await openContainer(bytes, options), options);
}

/** The same, at once, for every container but archives (npz) and HDF5. */
export function readUpload(bytes: Uint8Array, context: ReadContext): ReadResult {
  const options = optionsFor(context, kindReaders[context.kind]);
  return readOpened(openText(bytes, options), options);
}

export type SamplesResult =
  | { ok: true; records: SampleRecord[]; notes: Note[]; columns: ColumnReading[]; rowCount: number }
  | ReadFailure;

/** Reads posterior draws of companions, an attachment to a file of companions. */
export function readCompanionSamples(
  bytes: Uint8Array,
  context: Omit<ReadContext, 'kind'>,
): SamplesResult {
  const asCompanions: ReadContext = { ...context, kind: 'companions' };
  const options = optionsFor(asCompanions, sampleReader);
  const { faults, notes, remains } = options;
  const opened = openText(bytes, options);
  if (opened === null || !('table' in opened)) {
    return failure(asCompanions, [], faults, notes, remains);
  }
  const { table } = opened;
  remains.table = table;
  const { records, columns } = readRows(table, sampleReader, asCompanions, faults, notes);
  if (faults.count > 0) return failure(asCompanions, columns, faults, notes, remains);
  return { ok: true, records, notes: notes.list(), columns, rowCount: table.rowCount };
}
