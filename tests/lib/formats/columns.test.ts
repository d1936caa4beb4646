import { describe, expect, it } from 'vitest';
import { faultsOf, notesOf, readText, recordsOf } from './read-text';

describe('bindColumns(headings)', () => {
  it('takes case, spaces, hyphens and underscores as equal, and units in either bracket', () => {
    const text = 'NAME,Distance (pc),AGE [Myr],Gaia DR3-ID,Mag-K (mag)\nA,20,100,12,5.5\n';
    const [target] = recordsOf('targets', text).records;
    expect(target).toMatchObject({ name: 'A', distancePc: 20, ageMyr: 100, gaiaDr3Id: '12' });
    expect(target.magnitudes).toEqual({ K: { valueMag: 5.5, errorMag: null } });
  });

  it('converts units and says so', () => {
    const text =
      'name,distance [kpc],age [Gyr],mass [Mjup],membership_probability [%]\nA,0.02,0.1,1047.5655,50\n';
    const { records, notes } = recordsOf('targets', text);
    const [target] = records;
    expect([target.distancePc, target.ageMyr, target.membershipProbability]).toEqual([
      20, 100, 0.5,
    ]);
    expect(target.hostMassMsun).toBeCloseTo(1, 7);
    expect(notesOf(notes, 'information')).toContain('unit-converted at line 1');
  });

  it('reads an error without a unit in the unit of its value', () => {
    const text =
      'target,companion,status,mass [Mearth],mass_error,semi_major_axis\nA,b,confirmed,317.8284,31.78284,40\n';
    const [companion] = recordsOf('companions', text).records;
    expect(companion.massMjup).toBeCloseTo(1, 6);
    expect(companion.massErrorLowerMjup).toBeCloseTo(0.1, 7);
  });

  it('tells an unknown unit from a unit of another quantity', () => {
    expect(faultsOf('targets', 'name,distance [ly]\nA,1\n')).toEqual([
      'unit-unknown at line 1, column "distance"',
    ]);
    expect(faultsOf('targets', 'name,mass [kpc]\nA,1\n')).toEqual([
      'unit-mismatch at line 1, column "mass"',
    ]);
    expect(faultsOf('targets', 'name,binary_eccentricity [AU]\nA,0.1\n')).toEqual([
      'unit-mismatch at line 1, column "binary_eccentricity"',
    ]);
  });

  it('suggests the column that was meant', () => {
    const { notes } = recordsOf('targets', 'name,distance,age,spectral_tpe\nA,1,2,G2V\n');
    expect(notes.find((note) => note.code === 'column-ignored')?.message).toContain(
      'did you mean "spectral_type"',
    );
    const result = readText('targets', 'nmae,ra,dec\nA,1,2\n');
    expect(result.ok ? '' : result.faults[0].hint).toContain('"nmae"');
  });

  it('follows the mapping of the person, and leaves out what is mapped to nothing', () => {
    const text = 'Star,d,age,name,__proto__\nA,20,100,old,x\n';
    const columnMap = { Star: 'name', d: 'distance', name: '' };
    const result = readText('targets', text, { columnMap });
    if (!result.ok || result.kind !== 'targets') throw new Error('not read');
    expect(result.records[0]).toMatchObject({ name: 'A', distancePc: 20 });
    expect(result.columns.map(({ index, readAs, unit }) => [index, readAs, unit])).toEqual([
      [1, 'name', null],
      [2, 'distance', 'pc'],
      [3, 'age', 'Myr'],
      [4, null, null],
      [5, null, null],
    ]);
    expect(notesOf(result.notes, 'information')).toContain(
      'column-left-out at line 1, column "name"',
    );
  });

  it('says which kind the columns look like', () => {
    const result = readText('targets', 'target,separation,contrast,band\nA,1,9,K\n');
    expect(notesOf(result.notes, 'warning')).toContain('kind-mismatch at line 1');
    expect(result.notes.find((note) => note.code === 'kind-mismatch')?.message).toContain(
      'contrast curves',
    );
  });

  it('keeps bands that differ by case apart, and takes the spelling of the cooling relation', () => {
    const text = 'name,distance,age,mag_g,mag_G,mag_ks\nA,1,2,3,4,5\n';
    const [target] = recordsOf('targets', text, { bands: ['g', 'G', 'Ks'] }).records;
    expect(Object.keys(target.magnitudes)).toEqual(['g', 'G', 'Ks']);
  });
});
