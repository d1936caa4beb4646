import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readUpload, type UploadKind } from '@/lib/formats';
import { recordsOf } from './read-text';

const kinds: UploadKind[] = [
  'targets',
  'contrast-curves',
  'completeness-maps',
  'companions',
  'cooling-tables',
  'systems',
];
const headings: Record<UploadKind, string> = {
  targets: 'name,other_names,gaia_dr3_id,ra,dec,parallax,distance,age,age_error,mag_K,notes',
  'contrast-curves': 'target,separation,contrast,band,epoch,coverage',
  'completeness-maps': 'target,mass,semi_major_axis,completeness',
  companions: 'target,companion,status,mass,mass_error,semi_major_axis,band,epoch',
  'cooling-tables': 'age,mass,mag_K,mag_J',
  systems: 'system,weight,mass,semi_major_axis',
};
const cell = fc.oneof(
  fc.constantFrom(
    '',
    'A',
    'b',
    'confirmed',
    '1',
    '0.5',
    '-1',
    '1e-4',
    'nan',
    'inf',
    '"',
    '""',
    '"a\n"',
    ' ',
    ';',
    '\u0000',
  ),
  fc.double().map(String),
  fc.string({ unit: 'binary', maxLength: 8 }),
);

function tryRead(bytes: Uint8Array, kind: UploadKind) {
  const context = { fileName: 'x.csv', kind, defaultTarget: 'A', defaultBand: 'K', bands: ['K'] };
  const result = readUpload(bytes, context);
  // What is sent back from a worker must survive the way, and be the same each time.
  expect(structuredClone(result)).toEqual(result);
  expect(readUpload(bytes, context)).toEqual(result);
  if (!result.ok) expect(result.faults.length).toBeGreaterThan(0);
}

describe('readUpload(bytes, context)', { timeout: 60_000 }, () => {
  it('answers any bytes with records or faults and never throws', () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 300 }), fc.constantFrom(...kinds), tryRead), {
      numRuns: 200,
    });
  });

  it('answers any table under the right headings with records or faults and never throws', () => {
    const table = fc.constantFrom(...kinds).chain((kind) => {
      const width = headings[kind].split(',').length;
      const row = fc
        .array(cell, { minLength: width, maxLength: width })
        .map((cells) => cells.join(','));
      return fc.tuple(fc.constant(kind), fc.array(row, { maxLength: 6 }));
    });
    fc.assert(
      fc.property(table, ([kind, rows]) => {
        const text = [headings[kind], ...rows].join('\n');
        tryRead(new TextEncoder().encode(text), kind);
      }),
      { numRuns: 300 },
    );
  });

  it('does not change the bytes it is given, which are kept with their digest', () => {
    const bytes = new TextEncoder().encode('\uFEFFname,distance,age\nA,1,2\n');
    const before = Uint8Array.from(bytes);
    readUpload(bytes, { fileName: 'x.csv', kind: 'targets' });
    expect(bytes).toEqual(before);
  });

  it('reads a view into a larger buffer', () => {
    const text = new TextEncoder().encode('xxxname,distance,age\nA,1,2\nyyy');
    const result = readUpload(text.subarray(3, text.length - 3), {
      fileName: 'x.csv',
      kind: 'targets',
    });
    expect(result.ok && result.rowCount).toBe(1);
  });

  it('answers a long table of unknown targets in time', () => {
    const targetNames = Array.from({ length: 2000 }, (_, i) => ({
      name: `Star ${i}`,
      otherNames: [],
    }));
    const rows = Array.from({ length: 20_000 }, (_, i) => `Stranger ${i},1,9,K`).join('\n');
    const result = readUpload(
      new TextEncoder().encode(`target,separation,contrast,band\n${rows}\n`),
      {
        fileName: 'x.csv',
        kind: 'contrast-curves',
        targetNames,
      },
    );
    if (result.ok) throw new Error('accepted');
    expect(result.faultCount).toBe(20_000);
    expect(result.faults.map((fault) => fault.code)).toEqual(Array(6).fill('target-unknown'));
    expect(result.faults[5].message).toBe('and 19995 more like it');
  });

  it('notes a default unit only where the file states none', () => {
    const units = (text: string) =>
      recordsOf('companions', text).notes.filter((note) => note.code === 'unit-default').length;
    expect(units('target,companion,status,mass [Mjup],semi_major_axis [AU]\n')).toBe(0);
    expect(units('target,companion,status,mass,semi_major_axis [AU]\n')).toBe(1);
  });
});
