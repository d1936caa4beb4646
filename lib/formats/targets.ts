import { isParallaxBiased } from '@/lib/quantities/magnitudes';
import { bandsOf } from './bands';
import { removeFormulaGuard } from './formula-guard';
import type { Magnitude, TargetRecord } from './kinds';
import { notNegative, positive, probability, type TableReading } from './reading';
import { readAge } from './target-age';
import { targetPairs } from './target-columns';
import { readDistance } from './target-distance';
import { TargetNames } from './target-names';

const epochRule = { min: 1800, max: 2200, expected: 'a Julian year such as 2016.0' };
const gaiaEpoch = 2016;
const catalogueEpoch = 2000;

/** What is told once for the whole table and not per row. */
interface Tally {
  withoutAgeError: number;
  catalogueEpochs: number;
  gaiaEpochs: number;
}

/** Reads a table of targets. */
export function readTargets(reading: TableReading): TargetRecord[] {
  if (!checkHeadings(reading)) return [];
  const names = new TargetNames(reading);
  const bands = bandsOf(reading.names());
  const tally: Tally = { withoutAgeError: 0, catalogueEpochs: 0, gaiaEpochs: 0 };
  const records: TargetRecord[] = [];
  for (let row = 0; row < reading.table.rowCount; row += 1) {
    records.push(readTarget(reading, row, names, bands, tally));
  }
  tell(reading, tally, bands);
  return records;
}

/** Reports columns that came without their partner; true where there is none. */
function checkHeadings(reading: TableReading): boolean {
  const before = reading.faults.count;
  const pairs: [string, string][] = [];
  for (const [a, b] of targetPairs) pairs.push([a, b], [b, a]);
  for (const band of bandsOf(reading.names().map((name) => name.replace(/_error$/, '')))) {
    pairs.push([`mag_${band}_error`, `mag_${band}`]);
  }
  for (const [present, absent] of pairs) {
    if (!reading.has(present) || reading.has(absent)) continue;
    reading.fault(reading.table.headingPlace, {
      code: 'pair-missing',
      found: `"${present}" without "${absent}"`,
      expected: present.endsWith('_error') ? `the column "${absent}" as well` : 'both or neither',
    });
  }
  return reading.faults.count === before;
}

function readTarget(
  reading: TableReading,
  row: number,
  names: TargetNames,
  bands: string[],
  tally: Tally,
): TargetRecord {
  const name = names.readName(row) ?? '';
  const otherNames = names.readOtherNames(row, name);
  const gaiaDr3Id = names.readGaiaId(row, name) ?? null;
  const position = readPosition(reading, row);
  const distance = readDistance(reading, row);
  const age = readAge(reading, row);
  const notes = reading.prose('notes', row) ?? null;
  const record: TargetRecord = {
    line: reading.place(row).line ?? row + 1,
    name,
    otherNames,
    gaiaDr3Id,
    ...position,
    refEpoch: readEpoch(reading, row, position.raDeg !== null, gaiaDr3Id !== null, tally),
    pmRaMasYr: reading.number('pmra', row) ?? null,
    pmDecMasYr: reading.number('pmdec', row) ?? null,
    ...distance,
    ...age,
    hostMassMsun: reading.number('mass', row, positive) ?? null,
    hostMassErrorMsun: reading.number('mass_error', row, notNegative) ?? null,
    spectralType: reading.text('spectral_type', row) ?? null,
    movingGroup: reading.text('moving_group', row) ?? null,
    membershipProbability: reading.number('membership_probability', row, probability) ?? null,
    magnitudes: readMagnitudes(reading, row, bands),
    ...readBinary(reading, row),
    debrisDisk: reading.boolean('debris_disk', row) ?? null,
    selectedForCompanion: reading.boolean('selected_for_companion', row) ?? null,
    notes: reading.table.hasFormulaGuards ? removeFormulaGuard(notes) : notes,
    reference: reading.text('reference', row, 1000) ?? null,
  };
  if (reading.faults.count === 0) tellAbout(reading, row, record);
  if (record.ageMyr !== null && record.ageLowerMyr === null && record.ageMinMyr === null) {
    tally.withoutAgeError += 1;
  }
  return record;
}

function readPosition(reading: TableReading, row: number) {
  const raDeg = reading.number('ra', row, {
    min: 0,
    below: 360,
    expected: '0 or more and less than 360 deg',
  });
  const decDeg = reading.number('dec', row, { min: -90, max: 90 });
  if (
    (raDeg === null && typeof decDeg === 'number') ||
    (decDeg === null && typeof raDeg === 'number')
  ) {
    const [present, absent] = raDeg === null ? ['dec', 'ra'] : ['ra', 'dec'];
    reading.fault(reading.place(row), {
      code: 'pair-missing',
      found: `"${present}" without "${absent}"`,
      expected: 'both or neither',
    });
  }
  return { raDeg: raDeg ?? null, decDeg: decDeg ?? null };
}

function readEpoch(
  reading: TableReading,
  row: number,
  hasPosition: boolean,
  hasGaiaId: boolean,
  tally: Tally,
): number | null {
  const stated = reading.number('ref_epoch', row, epochRule);
  if (stated !== null || !hasPosition) return stated ?? null;
  if (hasGaiaId) tally.gaiaEpochs += 1;
  else tally.catalogueEpochs += 1;
  return hasGaiaId ? gaiaEpoch : catalogueEpoch;
}

function readMagnitudes(reading: TableReading, row: number, bands: string[]) {
  const magnitudes: Record<string, Magnitude> = {};
  for (const band of bands) {
    const valueMag = reading.number(`mag_${band}`, row);
    const errorMag = reading.number(`mag_${band}_error`, row, notNegative);
    if (typeof valueMag === 'number') magnitudes[band] = { valueMag, errorMag: errorMag ?? null };
    else if (valueMag === null && typeof errorMag === 'number') {
      reading.missing(`mag_${band}`, row, 'a magnitude, as its error is given');
    }
  }
  return magnitudes;
}

function readBinary(reading: TableReading, row: number) {
  const eccentricityRule = { min: 0, below: 1, expected: '0 or more and less than 1' };
  const ratioRule = { above: 0, max: 1, expected: 'more than 0 and at most 1' };
  return {
    multiplicity:
      reading.choice('multiplicity', row, ['single', 'binary', 'multiple'] as const) ?? null,
    binarySemiMajorAxisAu: reading.number('binary_semi_major_axis', row, positive) ?? null,
    binaryEccentricity: reading.number('binary_eccentricity', row, eccentricityRule) ?? null,
    binaryMassRatio: reading.number('binary_mass_ratio', row, ratioRule) ?? null,
  };
}

/** Notes about one target: what it lacks for a contrast curve, and a parallax too uncertain. */
function tellAbout(reading: TableReading, row: number, record: TargetRecord): void {
  const { parallaxMas, parallaxErrorMas, distancePc, ageMyr, ageMinMyr } = record;
  const lacks: string[] = [];
  if (parallaxMas === null && distancePc === null) lacks.push('No distance and no parallax');
  if (ageMyr === null && ageMinMyr === null) lacks.push('No age');
  if (lacks.length > 0) {
    const message = `${lacks.join('. ')}: contrast curves of this target cannot be converted; ready completeness maps can`;
    reading.notes.warn('value-missing', message, reading.place(row));
  }
  const isAlone = distancePc === null && parallaxMas !== null && parallaxErrorMas !== null;
  if (isAlone && isParallaxBiased(parallaxMas, parallaxErrorMas)) {
    const message = `The parallax ${parallaxMas} ± ${parallaxErrorMas} mas is too uncertain to invert; a distance with its error is better`;
    reading.notes.warn('parallax-uncertain', message, reading.place(row));
  }
}

function tell(reading: TableReading, tally: Tally, bands: string[]): void {
  const { notes } = reading;
  const count = (n: number) => (n === 1 ? '1 target' : `${n} targets`);
  if (tally.withoutAgeError > 0) {
    notes.inform(
      'age-without-error',
      `${count(tally.withoutAgeError)}: the age has no error and is taken as exact`,
    );
  }
  if (tally.gaiaEpochs > 0) {
    notes.inform(
      'default-used',
      `${count(tally.gaiaEpochs)} with a Gaia DR3 number: ref_epoch 2016.0`,
    );
  }
  if (tally.catalogueEpochs > 0) {
    notes.inform('default-used', `${count(tally.catalogueEpochs)}: ref_epoch 2000.0`);
  }
  if (bands.length === 0 && reading.table.rowCount > 0) {
    notes.inform(
      'no-magnitudes',
      'No magnitudes are given; contrast curves need the one in their band',
    );
  }
  noteMarkup(reading);
}

/** Names that look like markup are text and stay text. */
function noteMarkup(reading: TableReading): void {
  for (let row = 0; row < reading.table.rowCount; row += 1) {
    if (/[<>]/.test(reading.raw('name', row) ?? '')) {
      const message = 'The name holds < or >; it is stored and shown as plain text';
      reading.notes.inform('shown-as-text', message, reading.place(row, 'name'));
    }
  }
}
