import { canonicalBand } from './bands';
import type { ColumnSpec } from './columns';
import { tellAboutMap } from './companion-map';
import type { CompanionRecord, CompanionStatus, EpochRecord, ReadContext } from './kinds';
import { foldName } from './names';
import { notNegative, positive, probability, type TableReading } from './reading';
import { quoteFound } from './reports';
import { TargetColumn } from './target-column';

export const companionColumns: readonly ColumnSpec[] = [
  { name: 'target' },
  { name: 'companion', required: true },
  { name: 'status', required: true },
  { name: 'mass', unit: 'companion mass' },
  { name: 'mass_error', unit: 'companion mass', errorOf: 'mass' },
  { name: 'mass_error_lower', unit: 'companion mass', errorOf: 'mass' },
  { name: 'mass_error_upper', unit: 'companion mass', errorOf: 'mass' },
  { name: 'semi_major_axis', unit: 'semi-major axis' },
  { name: 'semi_major_axis_error', unit: 'semi-major axis', errorOf: 'semi_major_axis' },
  { name: 'semi_major_axis_error_lower', unit: 'semi-major axis', errorOf: 'semi_major_axis' },
  { name: 'semi_major_axis_error_upper', unit: 'semi-major axis', errorOf: 'semi_major_axis' },
  { name: 'projected_separation', unit: 'semi-major axis' },
  { name: 'separation', unit: 'separation' },
  { name: 'separation_error', unit: 'separation', errorOf: 'separation' },
  { name: 'position_angle', unit: 'angle' },
  { name: 'position_angle_error', unit: 'angle', errorOf: 'position_angle' },
  { name: 'contrast', unit: 'contrast' },
  { name: 'contrast_error', unit: 'magnitude' },
  { name: 'band' },
  { name: 'epoch' },
  { name: 'eccentricity', unit: 'plain number' },
  { name: 'common_proper_motion' },
  { name: 'probability', unit: 'fraction' },
  { name: 'reference' },
];

const statuses = ['confirmed', 'candidate', 'ambiguous', 'background'] as const;
const motions = ['yes', 'no', 'untested'] as const;
/** Chance that it is a bound companion, where the file gives none. */
const defaultProbability: Partial<Record<CompanionStatus, number>> = {
  confirmed: 1,
  background: 0,
};

/** Reads a table of companions; a table without rows says that none was detected. */
export function readCompanions(reading: TableReading, context: ReadContext): CompanionRecord[] {
  const targets = new TargetColumn(reading, context);
  const hasRows = reading.table.rowCount > 0;
  if (!reading.has('target') && !hasRows && context.defaultTarget === undefined) {
    reading.notes.inform('no-rows', 'The table has no rows: no detections');
    return [];
  }
  if (!targets.check()) return [];
  if (!hasRows) reading.notes.inform('no-rows', 'The table has no rows: no detections');
  const known = new Map<string, FirstRow>();
  const records: CompanionRecord[] = [];
  const rows: number[] = [];
  for (let row = 0; row < reading.table.rowCount; row += 1) {
    const record = readCompanion(reading, row, targets, context);
    if (addEpoch(reading, row, record, known)) continue;
    if (reading.faults.count === 0) tellAboutMap(reading, row, record, context.maps);
    records.push(record);
    rows.push(row);
  }
  tellDefaults(
    reading,
    records.filter((_, i) => reading.raw('probability', rows[i]) === null),
  );
  tellEpochs(reading, records);
  return records;
}

function readCompanion(
  reading: TableReading,
  row: number,
  targets: TargetColumn,
  context: ReadContext,
): CompanionRecord {
  const target = targets.read(row) ?? '';
  const companion = reading.text('companion', row);
  if (companion === null) reading.missing('companion', row, 'a name such as b, B or cc1');
  const status = reading.choice('status', row, statuses);
  if (status === null) reading.missing('status', row, statuses.join(', '));
  const mass = reading.number('mass', row, positive);
  const semiMajorAxis = reading.number('semi_major_axis', row, positive);
  if (status === 'confirmed' || status === 'candidate') {
    const needs = (what: string) => `a ${status} companion needs a ${what}, or posterior samples`;
    if (mass === null) missing(reading, row, 'mass', needs('mass'));
    if (semiMajorAxis === null) missing(reading, row, 'semi_major_axis', needs('semi-major axis'));
  }
  const massErrors = readErrors(reading, row, 'mass');
  const axisErrors = readErrors(reading, row, 'semi_major_axis');
  const eccentricityRule = { min: 0, below: 1, expected: '0 or more and less than 1' };
  const stated = reading.number('probability', row, probability);
  const band = reading.text('band', row);
  return {
    line: reading.place(row).line ?? row + 1,
    target,
    companion: companion ?? '',
    status: status ?? 'ambiguous',
    massMjup: mass ?? null,
    massErrorLowerMjup: massErrors.lower,
    massErrorUpperMjup: massErrors.upper,
    semiMajorAxisAu: semiMajorAxis ?? null,
    semiMajorAxisErrorLowerAu: axisErrors.lower,
    semiMajorAxisErrorUpperAu: axisErrors.upper,
    projectedSeparationAu: reading.number('projected_separation', row, positive) ?? null,
    separationArcsec: reading.number('separation', row, positive) ?? null,
    separationErrorArcsec: reading.number('separation_error', row, notNegative) ?? null,
    positionAngleDeg: reading.number('position_angle', row) ?? null,
    positionAngleErrorDeg: reading.number('position_angle_error', row, notNegative) ?? null,
    contrastMag: reading.number('contrast', row) ?? null,
    contrastErrorMag: reading.number('contrast_error', row, notNegative) ?? null,
    band: typeof band === 'string' ? canonicalBand(band, context.bands) : null,
    epoch: reading.date('epoch', row) ?? null,
    eccentricity: reading.number('eccentricity', row, eccentricityRule) ?? null,
    commonProperMotion: reading.choice('common_proper_motion', row, motions) ?? null,
    probability: stated ?? (status ? (defaultProbability[status] ?? null) : null),
    reference: reading.text('reference', row, 1000) ?? null,
  };
}

function missing(reading: TableReading, row: number, column: string, message: string): void {
  reading.fault(reading.place(row, column), {
    code: 'value-missing',
    message: `found nothing; ${message}`,
  });
}

/** The errors of a value: `x_error`, or `x_error_lower` with `x_error_upper`. */
function readErrors(reading: TableReading, row: number, name: string) {
  const both = reading.number(`${name}_error`, row, notNegative);
  const lower = reading.number(`${name}_error_lower`, row, notNegative);
  const upper = reading.number(`${name}_error_upper`, row, notNegative);
  if (typeof both === 'number' && (typeof lower === 'number' || typeof upper === 'number')) {
    reading.fault(reading.place(row), {
      code: 'both-given',
      found: `${name}_error and also ${name}_error_lower or ${name}_error_upper`,
      expected: 'one way to state the error',
    });
  } else if ((lower === null) !== (upper === null)) {
    const [present, absent] = lower === null ? ['upper', 'lower'] : ['lower', 'upper'];
    reading.fault(reading.place(row), {
      code: 'pair-missing',
      found: `"${name}_error_${present}" without "${name}_error_${absent}"`,
      expected: 'both or neither',
    });
  }
  return { lower: both ?? lower ?? null, upper: both ?? upper ?? null };
}

interface FirstRow {
  row: number;
  record: CompanionRecord;
}

/** What rows of one companion at several epochs state alike. */
const STATED = [
  'status',
  'massMjup',
  'massErrorLowerMjup',
  'massErrorUpperMjup',
  'semiMajorAxisAu',
  'semiMajorAxisErrorLowerAu',
  'semiMajorAxisErrorUpperAu',
  'probability',
] as const;

const epochOf = (record: CompanionRecord): EpochRecord => ({
  separationArcsec: record.separationArcsec,
  separationErrorArcsec: record.separationErrorArcsec,
  positionAngleDeg: record.positionAngleDeg,
  positionAngleErrorDeg: record.positionAngleErrorDeg,
  contrastMag: record.contrastMag,
  contrastErrorMag: record.contrastErrorMag,
  band: record.band,
  epoch: record.epoch,
  reference: record.reference,
});

const isMeasured = ({ epoch, separationArcsec, positionAngleDeg }: EpochRecord) =>
  epoch !== null && separationArcsec !== null && positionAngleDeg !== null;

/**
 * A companion stands on one row, or on one row an epoch where they state the same otherwise.
 *
 * @returns whether the row belongs to a companion that an earlier row brought
 */
function addEpoch(
  reading: TableReading,
  row: number,
  record: CompanionRecord,
  known: Map<string, FirstRow>,
): boolean {
  const { target, companion } = record;
  if (target === '' || companion === '') return false;
  // b and B are different companions, so only the target's name is folded.
  const key = `${foldName(target)}\n${companion}`;
  const first = known.get(key);
  if (first === undefined) {
    known.set(key, { row, record });
    return false;
  }
  const further = epochOf(record);
  const epochs = [epochOf(first.record), ...(first.record.furtherEpochs ?? [])];
  const isOther = epochs.every(
    ({ epoch, band }) => epoch !== further.epoch || band !== further.band,
  );
  const isSame = STATED.every((field) => record[field] === first.record[field]);
  if (isMeasured(further) && isMeasured(epochs[0]) && isOther && isSame) {
    first.record.furtherEpochs = [...epochs.slice(1), further];
    return true;
  }
  const { line } = reading.place(first.row);
  const place = line === undefined ? `row ${first.row + 1}` : `line ${line}`;
  reading.fault(reading.place(row, 'companion'), {
    code: 'name-duplicate',
    message: `${quoteFound(`${target} ${companion}`)} is already on ${place}; expected each companion once, or once an epoch with the same status, mass and axis`,
  });
  return true;
}

function tellEpochs(reading: TableReading, records: CompanionRecord[]): void {
  const count = records.reduce((sum, { furtherEpochs = [] }) => sum + furtherEpochs.length, 0);
  if (count === 0) return;
  const rows = count === 1 ? '1 row is a further epoch' : `${count} rows are further epochs`;
  reading.notes.inform('further-epochs', `${rows} of companions on earlier rows`);
}

function tellDefaults(reading: TableReading, unstated: CompanionRecord[]): void {
  const taken = unstated.filter(({ probability: value }) => value !== null);
  if (taken.length === 0) return;
  const rows = taken.length === 1 ? '1 companion' : `${taken.length} companions`;
  reading.notes.inform(
    'default-used',
    `${rows} without a probability: 1 for confirmed, 0 for background`,
  );
}
