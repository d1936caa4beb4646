import { describe, expect, it } from 'vitest';
import type { KnownMap } from '@/lib/formats';
import { completenessAt } from '@/lib/formats/companion-map';
import { faultsOf, notesOf, recordsOf } from './read-text';

const map: KnownMap = {
  massMjup: [1, 10, 100],
  semiMajorAxisAu: [10, 1000],
  completeness: [0, 0.2, 0.4, 0.6, 0.8, 1],
};

describe('completenessAt(map, mass, semiMajorAxis)', () => {
  it('returns the nodes, the edges included', () => {
    expect(completenessAt(map, 1, 10)).toBe(0);
    expect(completenessAt(map, 10, 1000)).toBe(0.6);
    expect(completenessAt(map, 100, 1000)).toBe(1);
  });

  it('is linear in the logarithms between nodes', () => {
    expect(completenessAt(map, Math.sqrt(10), 100)).toBeCloseTo((0 + 0.2 + 0.4 + 0.6) / 4, 12);
  });

  it('is null outside the map', () => {
    expect(completenessAt(map, 0.99, 100)).toBeNull();
    expect(completenessAt(map, 10, 1001)).toBeNull();
  });
});

describe('readCompanions(table)', () => {
  const header = 'target,companion,status,mass,semi_major_axis';

  it('gives confirmed companions probability 1, background 0, others none', () => {
    const text = `${header},probability\nA,b,confirmed,5,40,\nA,c,candidate,5,40,\nA,d,background,,,\nA,e,candidate,5,40,0.3\n`;
    expect(recordsOf('companions', text).records.map((c) => c.probability)).toEqual([
      1,
      null,
      0,
      0.3,
    ]);
  });

  it('tells b from B, and refuses the same companion twice', () => {
    expect(
      recordsOf('companions', `${header}\nA,b,confirmed,5,40\nA,B,confirmed,5,40\n`).records,
    ).toHaveLength(2);
    expect(faultsOf('companions', `${header}\nA,b,confirmed,5,40\na,b,confirmed,5,40\n`)).toEqual([
      'name-duplicate at line 3, column "companion"',
    ]);
  });

  it('takes further rows of a companion for further epochs, if they state the same otherwise', () => {
    const columns = `${header},epoch,separation [arcsec],position_angle [deg],band`;
    const first = 'A,b,confirmed,5,40,2015-01-02,0.8,30,H';
    const read = (...rows: string[]) =>
      recordsOf('companions', `${columns}\n${[first, ...rows].join('\n')}\n`).records;
    const [record, ...others] = read(
      'a,b,confirmed,5,40,2016-03-04,0.81,31,H',
      'A,b,confirmed,5,40,2016-03-04,0.82,31,K',
    );
    expect(others).toEqual([]);
    expect(record.furtherEpochs?.map((one) => [one.epoch, one.band, one.separationArcsec])).toEqual(
      [
        ['2016-03-04', 'H', 0.81],
        ['2016-03-04', 'K', 0.82],
      ],
    );
    for (const row of [
      'A,b,confirmed,5,40,2015-01-02,0.9,30,H',
      'A,b,confirmed,6,40,2016-03-04,0.81,31,H',
      'A,b,confirmed,5,40,2016-03-04,,31,H',
    ]) {
      expect(faultsOf('companions', `${columns}\n${first}\n${row}\n`)).toEqual([
        'name-duplicate at line 3, column "companion"',
      ]);
    }
  });

  it.each([
    ['mass_error_lower', '1', 'pair-missing at line 2'],
    ['mass_error,mass_error_lower,mass_error_upper', '1,1,2', 'both-given at line 2'],
    ['common_proper_motion', 'perhaps', 'choice-unknown at line 2, column "common_proper_motion"'],
    ['probability', '1.5', 'probability-range at line 2, column "probability"'],
  ])('refuses %s = %s', (columns, cells, fault) => {
    expect(faultsOf('companions', `${header},${columns}\nA,b,confirmed,5,40,${cells}\n`)).toEqual([
      fault,
    ]);
  });

  it('warns of a mass outside the map of its star, and of no background object', () => {
    const text = `${header}\nA,b,confirmed,500,40\nA,c,background,500,40\n`;
    const { notes } = recordsOf('companions', text, { maps: new Map([['A', map]]) });
    expect(notesOf(notes, 'warning')).toEqual(['outside-map at line 2']);
    expect(notes.find((note) => note.code === 'outside-map')?.message).toContain('1 to 100 Mjup');
  });

  it('reads a table without rows as no detections', () => {
    const { records, notes } = recordsOf('companions', `${header}\n`);
    expect([records, notes.map((note) => note.code)]).toEqual([
      [],
      expect.arrayContaining(['no-rows']),
    ]);
  });

  it('can be given a context that was cloned into a worker', () => {
    const context = structuredClone({
      maps: new Map([['A', map]]),
      targetNames: [{ name: 'A', otherNames: [] }],
    });
    expect(
      recordsOf('companions', `${header}\nA,b,confirmed,5,40\n`, context).records,
    ).toHaveLength(1);
  });
});
