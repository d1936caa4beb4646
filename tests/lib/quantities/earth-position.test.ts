import { describe, expect, it } from 'vitest';
import { earthFromBarycentre, julianYearOf } from '@/lib/quantities/earth-position';

/** Julian year (TDB), x, y, z [au]: get_body_barycentric('earth'), built-in ephemeris, Astropy 5.2.1. */
const ASTROPY = [
  [1950.5, 0.1913987, -0.9144885, -0.3966694],
  [1969.25, -0.971165, -0.1993247, -0.0865032],
  [1985.7, 0.9911731, -0.1405061, -0.0609953],
  [1999.9, 0.4368853, 0.8062673, 0.3497871],
  [2008.13, -0.8433561, 0.4772729, 0.2068413],
  [2016.0, -0.1716334, 0.8890722, 0.3852466],
  [2021.46, -0.070041, -0.9259777, -0.4012588],
  [2026.9, 0.4459925, 0.8029028, 0.3481311],
  [2040.3, -0.8625833, -0.4625832, -0.2007066],
  [2049.8, 0.893285, 0.4015963, 0.1740746],
];

describe('earthFromBarycentre', () => {
  it.each(ASTROPY)('is within its stated accuracy of Astropy in %d', (year, x, y, z) => {
    const earth = earthFromBarycentre(year);
    expect(Math.hypot(earth.x - x, earth.y - y, earth.z - z)).toBeLessThan(4e-4);
  });

  it('refuses years that were not held against anything', () => {
    expect(() => earthFromBarycentre(1949)).toThrow('between 1950 and 2050');
    expect(() => earthFromBarycentre(Number.NaN)).toThrow(RangeError);
  });
});

describe('julianYearOf', () => {
  // 2451545.0 is noon of 1 January 2000 by definition; 365.25 days are a Julian year.
  it.each([
    ['2000-01-01', 2000],
    ['2000-12-31', 2000 + 365 / 365.25],
    ['2004-01-01', 2004],
    ['2016-03-05T00:00:00Z', 2000 + 5907.5 / 365.25],
  ])('of %s', (date, year) => {
    expect(julianYearOf(date)).toBeCloseTo(year, 9);
  });

  it('refuses what is no date', () => {
    expect(() => julianYearOf('spring')).toThrow('not a date');
  });
});
