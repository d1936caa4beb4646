import { describe, expect, it } from 'vitest';
import { readUpload } from '@/lib/formats';
import { faultsOf, notesOf, recordsOf } from './read-text';

const ages = (style: string, cells: string) =>
  recordsOf('targets', `name,distance,age,${style}\nA,20,${cells}\n`).records[0];

describe('readTargets(table)', () => {
  it('computes the 16 and 84 % points of an age from each style of error', () => {
    expect(ages('age_error', '100,20')).toMatchObject({ ageLowerMyr: 80, ageUpperMyr: 120 });
    expect(ages('age_error_lower,age_error_upper', '100,20,50')).toMatchObject({
      ageLowerMyr: 80,
      ageUpperMyr: 150,
    });
    expect(ages('log_age_error', '100,1')).toMatchObject({ ageLowerMyr: 10, ageUpperMyr: 1000 });
    expect(ages('age_min,age_max', ',50,150')).toMatchObject({
      ageMyr: null,
      ageLowerMyr: null,
      ageMinMyr: 50,
      ageMaxMyr: 150,
    });
  });

  it.each([
    ['age_error', '20,20', 'out-of-range at line 2, column "age_error"'],
    ['age_error', ',20', 'value-missing at line 2, column "age"'],
    ['age_error', '13801,1', 'out-of-range at line 2, column "age"'],
    ['age_min,age_max', ',150,50', 'range-order at line 2'],
    ['age_min,age_max', '20,50,150', 'inconsistent at line 2'],
    ['age_min,age_max', ',50,', 'pair-missing at line 2'],
    ['age_error,log_age_error', '100,20,0.1', 'both-given at line 2'],
    ['age_min', ',50', 'pair-missing at line 1'],
  ])('refuses %s with %s', (style, cells, fault) => {
    expect(faultsOf('targets', `name,distance,age,${style}\nA,20,${cells}\n`)).toEqual([fault]);
  });

  it.each([
    ['ra,dec', '360,0', 'out-of-range at line 2, column "ra"'],
    ['ra,dec', '1,90.1', 'out-of-range at line 2, column "dec"'],
    ['ra,dec', '1,', 'pair-missing at line 2'],
    ['mass', '0', 'out-of-range at line 2, column "mass"'],
    ['binary_eccentricity', '1', 'out-of-range at line 2, column "binary_eccentricity"'],
    ['binary_mass_ratio', '1.1', 'out-of-range at line 2, column "binary_mass_ratio"'],
    [
      'membership_probability',
      '1.1',
      'probability-range at line 2, column "membership_probability"',
    ],
    ['debris_disk', 'maybe', 'not-a-boolean at line 2, column "debris_disk"'],
    ['mag_K_error', '0.1', 'pair-missing at line 1'],
    ['mag_K,mag_K_error', '5,-1', 'out-of-range at line 2, column "mag_K_error"'],
    ['gaia_dr3_id', '9223372036854775808', 'out-of-range at line 2, column "gaia_dr3_id"'],
    ['gaia_dr3_id', '6151712717763155414.0', 'integer-precision at line 2, column "gaia_dr3_id"'],
    ['gaia_dr3_id', 'DR3', 'not-a-number at line 2, column "gaia_dr3_id"'],
    ['spectral_type', '=G2V', 'name-start at line 2, column "spectral_type"'],
    ['other_names', 'B;@C', 'name-start at line 2, column "other_names"'],
    ['ref_epoch', '57000', 'out-of-range at line 2, column "ref_epoch"'],
  ])('refuses %s = %s', (columns, cells, fault) => {
    expect(faultsOf('targets', `name,distance,age,${columns}\nA,20,100,${cells}\n`)).toEqual([
      fault,
    ]);
  });

  it('takes yes, T and 1 as true', () => {
    const text = 'name,distance,age,debris_disk\nA,1,2,yes\nB,1,2,T\nC,1,2,0\nD,1,2,\n';
    expect(recordsOf('targets', text).records.map((t) => t.debrisDisk)).toEqual([
      true,
      true,
      false,
      null,
    ]);
  });

  it('refuses a name that is another target’s other name', () => {
    const text = 'name,other_names,distance,age\nA,HD 1; HIP 2,1,2\nhd1,,1,2\n';
    expect(faultsOf('targets', text)).toEqual(['name-duplicate at line 3, column "name"']);
  });

  it('accepts catalogue names with brackets and asterisks', () => {
    const text = 'name,distance,age\n* alf Cen,1,2\n[FLG2003] 7,1,2\n';
    expect(recordsOf('targets', text).records.map((t) => t.name)).toEqual([
      '* alf Cen',
      '[FLG2003] 7',
    ]);
  });

  it('lets distance and parallax disagree by 5 sigma at most, or by 5 % without errors', () => {
    const both = (cells: string) =>
      `name,age,parallax,parallax_error,distance,distance_error\nA,2,${cells}\n`;
    expect(recordsOf('targets', both('50,1,22,0')).records).toHaveLength(1);
    expect(faultsOf('targets', both('50,0.1,20.3,0.01'))).toEqual(['inconsistent at line 2']);
    expect(recordsOf('targets', both('50,,20.9,')).records).toHaveLength(1);
    expect(faultsOf('targets', both('50,,21.2,'))).toEqual(['inconsistent at line 2']);
  });

  it('uses the epoch 2016.0 with a Gaia number and 2000.0 without, and says so', () => {
    const text = 'name,gaia_dr3_id,ra,dec,distance,age\nA,7,1,2,3,4\nB,,1,2,3,4\nC,,,,3,4\n';
    const { records, notes } = recordsOf('targets', text);
    expect(records.map((t) => t.refEpoch)).toEqual([2016, 2000, null]);
    expect(notes.filter((note) => note.code === 'default-used')).toHaveLength(2);
  });

  it('warns of what a contrast curve will miss and of a parallax too uncertain to invert', () => {
    const text = 'name,parallax,parallax_error,age\nA,10,2,100\nB,,,\n';
    expect(notesOf(recordsOf('targets', text).notes, 'warning')).toEqual([
      'parallax-uncertain at line 2',
      'value-missing at line 3',
    ]);
  });

  it('refuses controls in notes but keeps line breaks and tabs', () => {
    const text = (notes: string) => `name,distance,age,notes\nA,1,2,"${notes}"\n`;
    expect(recordsOf('targets', text('a\tb\nc')).records[0].notes).toBe('a\tb\nc');
    expect(faultsOf('targets', text('a\u0007b'))).toEqual([
      'control-character at line 2, column "notes"',
    ]);
    expect(faultsOf('targets', text('a\u202eb'))).toEqual([
      'control-character at line 2, column "notes"',
    ]);
  });
});

describe('a target that is left out', () => {
  it('takes its faults with it, and the lines of the others keep their numbers', () => {
    const text = 'name,distance,age\nOne,far,30\nTwo,40,30\nThree,none,30\n';
    const read = (leaveOut?: string[]) =>
      readUpload(new TextEncoder().encode(text), { fileName: 't.csv', kind: 'targets', leaveOut });
    expect(read(['one', 'THREE'])).toMatchObject({
      ok: true,
      rowCount: 3,
      records: [{ name: 'Two', line: 3 }],
    });
    expect(read(['one'])).toMatchObject({ ok: false, faults: [{ code: 'not-a-number', line: 4 }] });
  });
});
