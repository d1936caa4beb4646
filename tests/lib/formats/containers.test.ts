import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import {
  type Container,
  type MapRecord,
  type ReadContext,
  readUploadedFile,
  type TargetRecord,
  type UploadKind,
} from '@/lib/formats';

const folder = path.resolve(import.meta.dirname, '../../fixtures/samples');

async function read<Record>(
  kind: UploadKind,
  name: string,
  context: Partial<ReadContext> = {},
): Promise<{ records: Record[]; container: Container; warnings: string[] }> {
  const bytes = new Uint8Array(readFileSync(path.join(folder, name)));
  const result = await readUploadedFile(bytes, { fileName: name, kind, ...context });
  if (!result.ok) throw new Error(JSON.stringify(result.faults));
  const warnings = result.notes.filter(({ level }) => level === 'warning').map(({ code }) => code);
  return { records: result.records as Record[], container: result.container, warnings };
}

/** Without the place in the file, which is what a container may differ in. */
const contentOf = ({ line: _, ...content }: TargetRecord) => content;
const star = { defaultTarget: 'RB 0001' };

describe('readUploadedFile(samples of every container)', () => {
  it.each([
    ['ecsv', 'targets.ecsv'],
    ['ecsv', 'targets-space.ecsv'],
    ['votable', 'targets-tabledata.vot'],
    ['votable', 'targets-binary.vot'],
    ['votable', 'targets-binary2.vot'],
    ['fits', 'targets.fits'],
    ['json', 'targets.json'],
  ])('%s: %s holds the same targets as the CSV, to the last bit', async (container, name) => {
    const expected = await read<TargetRecord>('targets', 'targets.csv');
    const found = await read<TargetRecord>('targets', name);
    expect(found.container).toBe(container);
    expect(found.records.map(contentOf)).toEqual(expected.records.map(contentOf));
    expect(found.warnings).toEqual(expected.warnings);
  });

  it('reads the same curves from ECSV and CSV', async () => {
    const csv = await read<object>('contrast-curves', 'contrast.csv');
    const ecsv = await read<object>('contrast-curves', 'contrast.ecsv');
    const without = (records: object[]) => records.map((one) => ({ ...one, firstLine: 0 }));
    expect(without(ecsv.records)).toEqual(without(csv.records));
  });

  it('reads the same cube from NPZ, compressed NPZ, HDF5 and FITS', async () => {
    const [npz, packed, hdf5, fits] = await Promise.all(
      ['maps.npz', 'maps-compressed.npz', 'maps.h5', 'maps-cube.fits'].map((name) =>
        read<MapRecord>('completeness-maps', name),
      ),
    );
    expect(npz.records).toHaveLength(12);
    expect(npz.records[11].completeness).toHaveLength(40 * 50);
    expect(new Set(npz.records.flatMap(({ completeness }) => completeness)).size).toBeGreaterThan(
      100,
    );
    expect(packed.records).toEqual(npz.records);
    expect(hdf5.records).toEqual(npz.records);
    expect(fits.records).toEqual(npz.records);
  });

  it('reads C order, Fortran order and float64 arrays to one map', async () => {
    const axes = { mass: 'geomspace(0.5, 80, 40)', semiMajorAxis: 'geomspace(1,1000,50)' };
    const [c, fortran, double] = await Promise.all(
      ['map-one.npy', 'map-one-fortran.npy', 'map-one-f8.npy'].map((name) =>
        read<MapRecord>('completeness-maps', name, { ...star, axes }),
      ),
    );
    expect(fortran.records).toEqual(c.records);
    const [map] = c.records;
    const [exact] = double.records;
    const largest = Math.max(
      ...map.completeness.map((value, i) => Math.abs(value - exact.completeness[i])),
    );
    expect(largest).toBeLessThan(2 ** -24);
    const image = await read<MapRecord>('completeness-maps', 'map-one.fits');
    expect(image.records[0].completeness).toEqual(map.completeness);
    expect(image.records[0].target).toBe('RB 0001');
    expect(map.massMjup[0]).toBe(0.5);
    expect(map.massMjup[39]).toBe(80);
  });

  it('undoes BSCALE: integers of 1e-4, cut off by their writer, lie within a step of the floats', async () => {
    const floats = await read<MapRecord>('completeness-maps', 'map-one.fits');
    const whole = await read<MapRecord>('completeness-maps', 'map-int16-bscale.fits', star);
    const largest = Math.max(
      ...whole.records[0].completeness.map((value, i) =>
        Math.abs(value - floats.records[0].completeness[i]),
      ),
    );
    expect(largest).toBeGreaterThan(0);
    expect(largest).toBeLessThan(1.0001e-4);
  });

  it('reads one map as JSON', async () => {
    const { records } = await read<MapRecord>('completeness-maps', 'map.json');
    expect(records).toEqual([
      {
        target: 'RB 0001',
        massMjup: [1, 3, 10],
        semiMajorAxisAu: [5, 20, 80, 320],
        completeness: [0, 0.1, 0.3, 0.2, 0.1, 0.5, 0.8, 0.6, 0.4, 0.9, 1, 0.8],
        nodeKind: 'nodes',
      },
    ]);
  });
});
