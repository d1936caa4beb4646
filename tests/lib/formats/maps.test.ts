import { describe, expect, it } from 'vitest';
import { faultsOf, notesOf, readText, recordsOf } from './read-text';

const wide = (text: string) => ['completeness-maps', text, { defaultTarget: 'A' }] as const;

describe('readLongMaps(table)', () => {
  const header = 'target,mass,semi_major_axis,completeness';

  it('fills each target’s grid from rows in any order', () => {
    const text = `${header}\nA,5,10,0.4\nB,1,10,0.2\nA,1,10,0.2\nB,1,5,0.1\nA,1.0,5,0.1\nB,2,10,1\nA,5,5,0.3\nB,2,5,0\n`;
    const { records } = recordsOf('completeness-maps', text);
    expect(records).toEqual([
      {
        target: 'A',
        massMjup: [1, 5],
        semiMajorAxisAu: [5, 10],
        completeness: [0.1, 0.2, 0.3, 0.4],
        nodeKind: 'nodes',
      },
      {
        target: 'B',
        massMjup: [1, 2],
        semiMajorAxisAu: [5, 10],
        completeness: [0.1, 0.2, 0, 1],
        nodeKind: 'nodes',
      },
    ]);
  });

  it('refuses axes that look like logarithms, and maps of one pixel', () => {
    const logs = readText('completeness-maps', `${header}\nA,0,5,0.1\n`);
    expect(logs.ok ? '' : logs.faults[0].hint).toBe('Are these logarithms?');
    expect(faultsOf('completeness-maps', `${header}\nA,1,5,0.1\n`)).toEqual([
      'map-shape at target "A"',
    ]);
  });

  it('refuses sides of more than 512', () => {
    const rows = Array.from(
      { length: 513 * 2 },
      (_, i) => `A,${1 + (i % 2)},${1 + Math.floor(i / 2)},0.5`,
    );
    expect(faultsOf('completeness-maps', `${header}\n${rows.join('\n')}\n`)).toEqual([
      'map-shape at target "A"',
    ]);
  });

  it('rounds values within 1e-6 onto 0 and 1 and counts those beyond', () => {
    const rows = (a: string, b: string) =>
      `${header}\nA,1,5,${a}\nA,1,10,${b}\nA,5,5,0.5\nA,5,10,1\n`;
    const { records, notes } = recordsOf('completeness-maps', rows('-1e-7', '1.0000005'));
    expect(records[0].completeness).toEqual([0, 1, 0.5, 1]);
    expect(notesOf(notes, 'information')).toContain('value-rounded at file');
    const result = readText('completeness-maps', rows('1.2', '-0.9'));
    if (result.ok) throw new Error('accepted');
    expect(result.faults).toHaveLength(1);
    expect(result.faults[0]).toMatchObject({
      code: 'probability-range',
      line: 2,
      found: '1.2 in the first of 2 such values (farthest -0.9)',
    });
  });

  it('reads unmeasured values as 0 only where the person chose so', () => {
    const text = `${header}\nA,1,5,nan\nA,1,10,\nA,5,5,0.5\nA,5,10,1\n`;
    expect(faultsOf('completeness-maps', text)).toEqual([
      'value-missing at line 3, column "completeness"',
      'not-finite at line 2, column "completeness"',
    ]);
    const { records, notes } = recordsOf('completeness-maps', text, { notMeasuredIsZero: true });
    expect(records[0].completeness).toEqual([0, 0, 0.5, 1]);
    expect(notesOf(notes, 'information')).toContain('not-measured at file');
  });

  it('reads per cent where the heading says so', () => {
    const text =
      'target,mass [Mearth],semi_major_axis,completeness [%]\nA,317.8284,5,50\nA,317.8284,6,100\nA,635.6568,5,0\nA,635.6568,6,1\n';
    const [map] = recordsOf('completeness-maps', text).records;
    expect(map.completeness).toEqual([0.5, 1, 0, 0.01]);
    expect(map.massMjup[0]).toBeCloseTo(1, 6);
  });
});

describe('readMapCube(json)', () => {
  it.each([
    ['solMass', [1, 1e308], 'out-of-range'],
    ['earthMass', [5e-324, 1e-323], 'out-of-range'],
  ])('refuses masses that the unit %s carries beyond what can be stored', (unit, values, code) => {
    const map = {
      target: 'A',
      mass: { unit, values },
      semi_major_axis: { unit: 'AU', values: [1, 2] },
      completeness: [
        [0, 1],
        [0, 1],
      ],
    };
    const [first] = faultsOf('completeness-maps', JSON.stringify(map), { fileName: 'map.json' });
    expect(first).toMatch(new RegExp(`^${code} at .*mass`));
  });
});

describe('WideMapReading(table)', () => {
  it('reads units from the corner', () => {
    const [map] = recordsOf(
      ...wide('mass [solMass]\\semi_major_axis [AU],5,10\n0.001,0.1,0.2\n0.002,0.3,0.4\n'),
    ).records;
    expect(map.massMjup[0]).toBeCloseTo(1.0475655, 7);
    expect(map.completeness).toEqual([0.1, 0.2, 0.3, 0.4]);
  });

  it.each([
    ['semi_major_axis\\mass,5,10\n1,0.1,0.2\n2,0.3,0.4\n', 'map-shape at line 1'],
    [
      'mass [kpc]\\semi_major_axis,5,10\n1,0.1,0.2\n2,0.3,0.4\n',
      'unit-mismatch at line 1, column 1',
    ],
    [',5,10\n2,0.1,0.2\n1,0.3,0.4\n', 'axis-order at line 3, column 1'],
    [',5,10\n1,0.1,0.2\n1,0.3,0.4\n', 'axis-order at line 3, column 1'],
    [',0,10\n1,0.1,0.2\n2,0.3,0.4\n', 'out-of-range at line 1, column 2'],
    [
      'mass [solMass]\\semi_major_axis,5,10\n1,0.1,0.2\n1e308,0.3,0.4\n',
      'out-of-range at line 3, column 1',
    ],
    [',5,10\n1,0.1,2\n2,0.3,0.4\n', 'probability-range at line 2, column 3'],
    [',5,10\n1,0.1,x\n2,0.3,0.4\n', 'not-a-number at line 2, column 3'],
    [',5,10\n1,0.1,0.2\n', 'map-shape at file'],
  ])('refuses %j', (text, fault) => {
    expect(faultsOf(...wide(text))).toEqual([fault]);
  });

  it('asks for the star that the map belongs to', () => {
    const text = ',5,10\n1,0.1,0.2\n2,0.3,0.4\n';
    expect(faultsOf('completeness-maps', text)).toEqual(['target-missing at file']);
    const targetNames = [{ name: 'A', otherNames: [] }];
    expect(faultsOf('completeness-maps', text, { defaultTarget: 'B', targetNames })).toEqual([
      'target-unknown at file',
    ]);
  });
});
