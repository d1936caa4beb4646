import type { ColumnSpec } from './columns';
import type { ReadContext, SampleRecord } from './kinds';
import { uploadLimits } from './limits';
import { notNegative, positive, type TableReading } from './reading';
import { quoteFound } from './reports';
import { TargetColumn } from './target-column';

export const sampleColumns: readonly ColumnSpec[] = [
  { name: 'target' },
  { name: 'companion', required: true },
  { name: 'mass', required: true, unit: 'companion mass' },
  { name: 'semi_major_axis', required: true, unit: 'semi-major axis' },
  { name: 'eccentricity', unit: 'plain number' },
  { name: 'weight', unit: 'plain number' },
];

const eccentricityRule = { min: 0, below: 1, expected: '0 or more and less than 1' };

/** Reads posterior draws of companions: one row per draw. */
export function readSampleRows(reading: TableReading, context: ReadContext): SampleRecord[] {
  const targets = new TargetColumn(reading, context);
  if (!targets.check()) return [];
  const records = new Map<string, SampleRecord>();
  for (let row = 0; row < reading.table.rowCount; row += 1) {
    const target = targets.read(row);
    const companion = reading.text('companion', row);
    const mass = readNeeded(reading, 'mass', row);
    const axis = readNeeded(reading, 'semi_major_axis', row);
    const eccentricity = reading.number('eccentricity', row, eccentricityRule);
    const weight = reading.number('weight', row, notNegative);
    if (companion === null) reading.missing('companion', row, 'a name such as b, B or cc1');
    if (reading.has('eccentricity') && eccentricity === null) {
      reading.missing('eccentricity', row, 'an eccentricity for each draw');
    }
    if (reading.has('weight') && weight === null)
      reading.missing('weight', row, 'a weight for each draw');
    if (typeof target !== 'string' || typeof companion !== 'string') continue;
    const record = recordOf(records, reading, target, companion, row);
    record.massMjup.push(mass ?? Number.NaN);
    record.semiMajorAxisAu.push(axis ?? Number.NaN);
    record.eccentricity?.push(eccentricity ?? Number.NaN);
    record.weight?.push(weight ?? Number.NaN);
  }
  for (const record of records.values()) checkCount(reading, record);
  return [...records.values()];
}

function readNeeded(reading: TableReading, name: 'mass' | 'semi_major_axis', row: number) {
  const value = reading.number(name, row, positive);
  if (value === null) reading.missing(name, row, 'a number for each draw');
  return value;
}

function recordOf(
  records: Map<string, SampleRecord>,
  reading: TableReading,
  target: string,
  companion: string,
  row: number,
): SampleRecord {
  const key = `${target}\n${companion}`;
  const known = records.get(key);
  if (known !== undefined) return known;
  const record: SampleRecord = {
    target,
    companion,
    massMjup: [],
    semiMajorAxisAu: [],
    eccentricity: reading.has('eccentricity') ? [] : null,
    weight: reading.has('weight') ? [] : null,
    firstLine: reading.place(row).line ?? row + 1,
  };
  records.set(key, record);
  return record;
}

function checkCount(reading: TableReading, record: SampleRecord): void {
  const { samplesPerCompanionMin: least, samplesPerCompanionMax: most } = uploadLimits;
  const count = record.massMjup.length;
  const item = `companion ${quoteFound(`${record.target} ${record.companion}`)}`;
  const found = `${count} draws`;
  if (count < least)
    reading.fault({ item }, { code: 'too-few', found, expected: `at least ${least}` });
  if (count > most)
    reading.fault({ item }, { code: 'too-many', found, expected: `at most ${most}` });
}
