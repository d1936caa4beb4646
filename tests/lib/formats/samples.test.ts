import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import {
  type ReadContext,
  type RecordsOfKind,
  readCompanionSamples,
  readUpload,
  type UploadKind,
} from '@/lib/formats';

const folder = path.resolve(import.meta.dirname, '../../fixtures/samples');
const load = (name: string) => new Uint8Array(readFileSync(path.join(folder, name)));

/** The file by a plain split: an outside expectation that shares nothing with the reader. */
function split(name: string): { header: string[]; rows: string[][] } {
  const lines = readFileSync(path.join(folder, name), 'utf8').trimEnd().split('\n');
  const [header, ...rows] = lines.map((line) => line.split(','));
  return { header, rows };
}

function read<K extends UploadKind>(
  kind: K,
  name: string,
  context: Partial<ReadContext> = {},
): { records: RecordsOfKind[K]; warnings: string[]; rowCount: number } {
  const result = readUpload(load(name), { fileName: name, kind, ...context });
  if (!result.ok) throw new Error(JSON.stringify(result.faults));
  const warnings = result.notes.filter((note) => note.level === 'warning').map(({ code }) => code);
  return { records: result.records as RecordsOfKind[K], warnings, rowCount: result.rowCount };
}

const numberOrNull = (text: string) => (text === '' ? null : Number(text));

describe('readUpload(samples)', () => {
  it.each(['targets.csv', 'targets-pandas.csv'])('reads %s to the numbers in it', (name) => {
    const { header, rows } = split(name);
    const { records, warnings } = read('targets', name);
    const cell = (row: string[], column: string) => row[header.indexOf(column)];
    expect(records.map((target) => target.name)).toEqual(rows.map((row) => cell(row, 'name')));
    rows.forEach((row, i) => {
      const target = records[i];
      expect(target.line).toBe(i + 2);
      expect(target.gaiaDr3Id).toBe(cell(row, 'gaia_dr3_id'));
      expect([target.raDeg, target.decDeg]).toEqual([
        Number(cell(row, 'ra')),
        Number(cell(row, 'dec')),
      ]);
      expect(target.refEpoch).toBe(2016);
      expect(target.parallaxMas).toBe(Number(cell(row, 'parallax')));
      expect(target.parallaxErrorMas).toBe(Number(cell(row, 'parallax_error')));
      const [age, error] = [Number(cell(row, 'age')), numberOrNull(cell(row, 'age_error'))];
      expect(target.ageMyr).toBe(age);
      expect(target.ageLowerMyr).toBe(error === null ? null : age - error);
      expect(target.ageUpperMyr).toBe(error === null ? null : age + error);
      expect(target.hostMassMsun).toBe(Number(cell(row, 'mass')));
      expect(target.spectralType).toBe(cell(row, 'spectral_type'));
      expect(target.multiplicity).toBe(cell(row, 'multiplicity'));
      expect(target.magnitudes).toEqual({
        K: { valueMag: Number(cell(row, 'mag_K')), errorMag: null },
      });
    });
    expect(records.length).toBeGreaterThan(9);
    expect(warnings).toEqual(name === 'targets.csv' ? [] : ['column-ignored']);
  });

  it('reads contrast.csv as one curve for each star, band and epoch', () => {
    const { rows } = split('contrast.csv');
    const { records } = read('contrast-curves', 'contrast.csv');
    const names = [...new Set(rows.map((row) => row[0]))];
    expect(records.map((curve) => curve.target)).toEqual(names);
    for (const curve of records) {
      const own = rows.filter((row) => row[0] === curve.target);
      expect(curve.separationArcsec).toEqual(own.map((row) => Number(row[1])));
      expect(curve.contrastMag).toEqual(own.map((row) => Number(row[2])));
      expect([curve.band, curve.epoch]).toEqual([own[0][3], own[0][4]]);
      expect([curve.nSigma, curve.thresholdProbability, curve.coverage]).toEqual([5, 0.5, null]);
      expect(curve.firstLine).toBe(rows.findIndex((row) => row[0] === curve.target) + 2);
    }
  });

  it('reads companions.csv, and companions-none.csv as no detections', () => {
    const { rows } = split('companions.csv');
    const { records } = read('companions', 'companions.csv');
    const numbers = records.map((c) => [
      c.massMjup,
      c.massErrorLowerMjup,
      c.massErrorUpperMjup,
      c.semiMajorAxisAu,
      c.semiMajorAxisErrorLowerAu,
      c.semiMajorAxisErrorUpperAu,
      c.probability,
    ]);
    expect(numbers).toEqual(rows.map((row) => row.slice(3, 10).map(numberOrNull)));
    expect(records.map((c) => [c.target, c.companion, c.status])).toEqual(
      rows.map((row) => row.slice(0, 3)),
    );
    expect(records.map((c) => c.reference ?? '')).toEqual(rows.map((row) => row[10]));
    const none = read('companions', 'companions-none.csv');
    expect([none.records, none.rowCount, none.warnings]).toEqual([[], 0, []]);
  });

  it('reads cooling-table.csv to a full grid [mass, age]', () => {
    const { rows } = split('cooling-table.csv');
    const [table] = read('cooling-tables', 'cooling-table.csv').records;
    const { massMjup, ageMyr, magnitudes } = table;
    expect(massMjup.length * ageMyr.length).toBe(rows.length);
    for (const [age, mass, magJ, magK] of rows.map((row) => row.map(Number))) {
      const index = massMjup.indexOf(mass) * ageMyr.length + ageMyr.indexOf(age);
      expect([magnitudes.J[index], magnitudes.K[index]]).toEqual([magJ, magK]);
    }
  });

  it('reads map-long.csv and map-wide.csv to the values in them', () => {
    const long = split('map-long.csv').rows;
    const { records } = read('completeness-maps', 'map-long.csv');
    const counted = records.reduce((sum, map) => sum + map.completeness.length, 0);
    expect(counted).toBe(long.length);
    const byTarget = new Map(records.map((map) => [map.target, map]));
    for (const [target, mass, axis, value] of long) {
      const map = byTarget.get(target);
      const i = map?.massMjup.indexOf(Number(mass)) ?? -1;
      const j = map?.semiMajorAxisAu.indexOf(Number(axis)) ?? -1;
      expect(map?.completeness[i * (map?.semiMajorAxisAu.length ?? 0) + j]).toBe(Number(value));
    }
    const wide = split('map-wide.csv');
    const [map] = read('completeness-maps', 'map-wide.csv', { defaultTarget: 'RB 0001' }).records;
    expect(map.semiMajorAxisAu).toEqual(wide.header.slice(1).map(Number));
    expect(map.massMjup).toEqual(wide.rows.map((row) => Number(row[0])));
    expect(map.completeness).toEqual(wide.rows.flatMap((row) => row.slice(1).map(Number)));
    expect([map.target, map.nodeKind]).toEqual(['RB 0001', 'nodes']);
  });

  it('reads companion-samples.csv as draws of each companion', () => {
    const { rows } = split('companion-samples.csv');
    const result = readCompanionSamples(load('companion-samples.csv'), {
      fileName: 'companion-samples.csv',
    });
    if (!result.ok) throw new Error(JSON.stringify(result.faults));
    const [record] = result.records;
    expect(result.records).toHaveLength(new Set(rows.map((row) => row.slice(0, 2).join())).size);
    expect(record.massMjup).toEqual(rows.map((row) => Number(row[2])));
    expect(record.semiMajorAxisAu).toEqual(rows.map((row) => Number(row[3])));
    expect(record.eccentricity).toEqual(rows.map((row) => Number(row[4])));
  });
});
