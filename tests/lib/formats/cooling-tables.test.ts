import { describe, expect, it } from 'vitest';
import { faultsOf, notesOf, recordsOf } from './read-text';

describe('readCoolingTable(table)', () => {
  it('keeps a ragged grid ragged, with null where the table has no entry', () => {
    const text =
      'age [Gyr],mass,mag_K,mag_J,temperature\n0.01,1,16,17,800\n0.01,5,12,,1500\n0.1,5,15,,900\n0.1,10,13,14,\n';
    const { records, notes } = recordsOf('cooling-tables', text);
    const [table] = records;
    expect([table.massMjup, table.ageMyr]).toEqual([
      [1, 5, 10],
      [10, 100],
    ]);
    expect(table.magnitudes).toEqual({
      K: [16, null, 12, 15, null, 13],
      J: [17, null, null, null, null, 14],
    });
    expect(table.temperatureK).toEqual([800, null, 1500, 900, null, null]);
    expect(table.logLuminosity).toBeNull();
    expect(notesOf(notes, 'information')).toContain('grid-ragged at file');
  });

  it.each([
    ['10,1,16\n10,1,15\n100,1,16\n100,5,16', 'grid-repeat at line 3'],
    ['10,0,16', 'out-of-range at line 2, column "mass"'],
    ['10,,16', 'value-missing at line 2, column "mass"'],
    ['10,1,bright', 'not-a-number at line 2, column "mag_K"'],
  ])('refuses %s', (rows, fault) => {
    expect(faultsOf('cooling-tables', `age,mass,mag_K\n${rows}\n`)).toEqual([fault]);
  });

  it('reports faults in masses and magnitudes together', () => {
    const text = 'age,mass,mag_K\n10,x,16\n10,1,y\n';
    expect(faultsOf('cooling-tables', text)).toEqual([
      'not-a-number at line 2, column "mass"',
      'not-a-number at line 3, column "mag_K"',
    ]);
  });

  it('lists each pair of masses between which a band brightens backwards', () => {
    const text = 'age,mass,mag_K,mag_J\n10,5,12,13\n10,1,11,16\n100,1,21,21\n100,5,20,22\n';
    expect(notesOf(recordsOf('cooling-tables', text).notes, 'warning')).toEqual([
      'not-monotonic at lines 2 and 3',
      'not-monotonic at lines 4 and 5',
    ]);
  });
});
