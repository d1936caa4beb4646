import type { Fault } from '@/lib/errors';
import { type ColumnUnit, ourUnit, readColumnUnit, type UnitProblem } from './column-units';
import { foldHeading, listHeadings, nearestTo, splitHeading } from './headings';
import type { ColumnReading } from './kinds';
import { isMissingWord, readNumberText } from './numbers';
import { type FaultReport, type NoteReport, quoteFound } from './reports';
import type { RawColumn, RawTable } from './table';

/** One column that a kind of file may have. */
export interface ColumnSpec {
  name: string;
  synonyms?: readonly string[];
  required?: boolean;
  /** What the numbers measure; absent for text, choices and dates. */
  unit?: ColumnUnit;
  /** An error without a unit of its own is in the unit of this column. */
  errorOf?: string;
}

/** A column of the file under our name, with its unit settled. */
export interface BoundColumn {
  name: string;
  /** The heading as written, without its unit: what a fault names. */
  label: string;
  raw: RawColumn;
  /** The unit that the file's numbers are in; null for text. */
  unit: string | null;
  ourUnit: string;
  /** Null where the numbers are in our unit already. */
  toOurUnit: ((value: number) => number) | null;
  /** False where the unit is our default and not the file's word. */
  isUnitStated: boolean;
  /** A contrast given as a ratio of fluxes. */
  isFluxRatio: boolean;
}

export interface ColumnBinding {
  columns: Map<string, BoundColumn>;
  readings: ColumnReading[];
  /** False where a heading is at fault: no row can be judged. */
  isReadable: boolean;
}

/** The columns of a kind: fixed ones, and a family such as `mag_<band>`. */
export interface KindColumns {
  specs: readonly ColumnSpec[];
  family?: (name: string) => ColumnSpec | null;
}

interface Candidate {
  index: number;
  raw: RawColumn;
  label: string;
  bracketUnit: string | null;
  spec: ColumnSpec | null;
}

/** The column of a kind that a heading means, or null. */
export function findSpec(name: string, kind: KindColumns): ColumnSpec | null {
  const fold = foldHeading(name);
  const fixed = kind.specs.find((spec) =>
    [spec.name, ...(spec.synonyms ?? [])].some((known) => foldHeading(known) === fold),
  );
  return fixed ?? kind.family?.(name) ?? null;
}

function candidates(
  table: RawTable,
  kind: KindColumns,
  columnMap: ReadonlyMap<string, string>,
): Candidate[] {
  return table.columns.map((raw, index) => {
    const { name, unit } = splitHeading(raw.heading);
    const mapped = columnMap.get(raw.heading.trim()) ?? columnMap.get(name);
    const wanted = mapped ?? name;
    const spec = wanted === '' ? null : findSpec(wanted, kind);
    return { index: index + 1, raw, label: name, bracketUnit: unit, spec };
  });
}

/**
 * Finds our columns among the headings of a table and settles their units.
 *
 * Unknown columns are ignored with a note. Missing, doubled or misread headings are faults: while
 * there is one, no row can be judged.
 */
export function bindColumns(
  table: RawTable,
  kind: KindColumns,
  columnMap: Record<string, string> | undefined,
  faults: FaultReport,
  notes: NoteReport,
): ColumnBinding {
  const map = new Map(Object.entries(columnMap ?? {}).map(([from, to]) => [from.trim(), to]));
  const before = faults.count;
  const found = candidates(table, kind, map);
  const chosen = new Map<string, Candidate>();
  for (const candidate of found) {
    const { spec } = candidate;
    if (spec === null) {
      noteIgnored(candidate, kind, map, table, notes);
      continue;
    }
    const first = chosen.get(spec.name);
    if (first === undefined) chosen.set(spec.name, candidate);
    else faults.add(duplicateFault(first, candidate, table));
  }
  reportMissing(table, kind, chosen, faults);
  const columns = bindUnits(table, chosen, faults, notes);
  const readings = found.map(({ index, raw, spec }) => {
    const bound = spec === null ? undefined : columns.get(spec.name);
    const isUsed = bound !== undefined && bound.raw === raw;
    return {
      index,
      heading: raw.heading,
      readAs: isUsed ? bound.name : null,
      unit: isUsed ? bound.unit || null : null,
    };
  });
  return { columns, readings, isReadable: faults.count === before };
}

function noteIgnored(
  { index, label, raw }: Candidate,
  kind: KindColumns,
  map: ReadonlyMap<string, string>,
  table: RawTable,
  notes: NoteReport,
): void {
  if (label === '') {
    const place = { ...table.headingPlace, item: `column ${index}` };
    notes.warn('column-ignored', `Column ${index} has no name and is ignored`, place);
    return;
  }
  const place = { ...table.headingPlace, column: label };
  const target = map.get(raw.heading.trim()) ?? map.get(label);
  if (target === '') {
    notes.inform('column-left-out', `Column ${quoteFound(label)} is left out, as asked`, place);
    return;
  }
  const near = nearestTo(
    label,
    kind.specs.map((spec) => spec.name),
  );
  const hint = near === null ? '; map it by hand if it is needed' : `; did you mean "${near}"?`;
  const own = table.unknownColumn?.(index - 1);
  const what = own ? 'Key' : 'Column';
  const message = `${what} ${quoteFound(label)} is not known and is ignored${hint}`;
  notes.warn(own?.code ?? 'column-ignored', message, own?.place ?? place);
}

function duplicateFault(first: Candidate, second: Candidate, table: RawTable): Fault {
  const [a, b] = [first.label, second.label];
  return {
    code: 'column-duplicate',
    ...table.headingPlace,
    item: `columns ${first.index} and ${second.index}`,
    message:
      a === b
        ? `column ${quoteFound(a)} appears twice; expected each name once`
        : `${quoteFound(a)} and ${quoteFound(b)} are the same column; expected it once`,
  };
}

function reportMissing(
  table: RawTable,
  kind: KindColumns,
  chosen: ReadonlyMap<string, Candidate>,
  faults: FaultReport,
): void {
  const headings = table.columns.map(({ heading }) => splitHeading(heading).name);
  for (const { name, required } of kind.specs) {
    if (!required || chosen.has(name)) continue;
    const near = headings.find((heading) => nearestTo(heading, [name]) !== null);
    const hint = looksLikeValues(headings)
      ? 'Is the header line missing?'
      : near && `Is ${quoteFound(near)} meant?`;
    faults.add({
      code: 'column-missing',
      ...table.headingPlace,
      message: `column "${name}" is missing; found ${listHeadings(headings)}`,
      ...(hint ? { hint } : {}),
    });
  }
}

function looksLikeValues(headings: string[]): boolean {
  return headings.some(
    (heading) => !isMissingWord(heading) && typeof readNumberText(heading, '') === 'number',
  );
}

function bindUnits(
  table: RawTable,
  chosen: ReadonlyMap<string, Candidate>,
  faults: FaultReport,
  notes: NoteReport,
): Map<string, BoundColumn> {
  const columns = new Map<string, BoundColumn>();
  const defaults: string[] = [];
  const conversions: string[] = [];
  for (const [name, candidate] of chosen) {
    const { raw, label, spec } = candidate;
    const measured = spec?.unit;
    const main = spec?.errorOf === undefined ? undefined : chosen.get(spec.errorOf);
    const own = raw.unit ?? candidate.bracketUnit;
    const inherited = main?.raw.unit ?? main?.bracketUnit ?? null;
    const stated = own ?? inherited;
    const base = { name, label, raw, unit: null, ourUnit: '', toOurUnit: null, isFluxRatio: false };
    if (measured === undefined) {
      columns.set(name, { ...base, isUnitStated: false });
      continue;
    }
    const reading = readColumnUnit(measured, stated);
    if ('code' in reading) {
      faults.add(unitFault(table, label, reading));
      continue;
    }
    const ours = ourUnit(measured);
    if (own === null && ours !== '') defaults.push(`${label} in ${reading.unit}`);
    if (reading.toOurUnit !== null) conversions.push(`${label} from ${reading.unit} to ${ours}`);
    columns.set(name, { ...base, ...reading, ourUnit: ours, isUnitStated: stated !== null });
  }
  if (defaults.length > 0) {
    const message = `No unit is given, so read: ${defaults.join(', ')}`;
    notes.inform('unit-default', message, table.headingPlace);
  }
  if (conversions.length > 0) {
    notes.inform('unit-converted', `Converted: ${conversions.join(', ')}`, table.headingPlace);
  }
  return columns;
}

function unitFault(table: RawTable, label: string, problem: UnitProblem): Fault {
  return { ...table.headingPlace, column: label, ...problem };
}
