import { describe, expect, it } from 'vitest';
import { sigmasApart, worstDisagreement } from '@/lib/quantities/agreement';
import {
  compareEntries,
  directionAt,
  findPairs,
  type SkyEntry,
  separationArcsec,
} from '@/lib/quantities/sky-match';

const entry = (given: Partial<SkyEntry>): SkyEntry => ({
  raDeg: 10,
  decDeg: -45,
  epochYr: 2000,
  pmRaMasYr: null,
  pmDecMasYr: null,
  distancePc: null,
  ...given,
});
const placed = (raDeg: number, decDeg: number) =>
  directionAt(entry({ raDeg, decDeg, epochYr: 2000 }), 2000);

describe('separationArcsec', () => {
  // SkyCoord.separation of Astropy 5.2.1.
  it.each([
    [10, -45, 10.001, -45.0005, 3.1176823845776025],
    [359.9999, 0, 0.0004, 0.0003, 2.099142682156917],
    [12, 89.9995, 192, 89.9996, 3.240000000012235],
  ])('from (%d, %d) to (%d, %d) is %d', (raA, decA, raB, decB, expected) => {
    expect(separationArcsec(placed(raA, decA), placed(raB, decB))).toBeCloseTo(expected, 8);
  });
});

describe('directionAt', () => {
  // SkyCoord.apply_space_motion of Astropy 5.2.1, radial velocity 0, Julian years of TCB.
  it.each([
    [269.45207, 4.69339, -802.803, 10362.542, 2016, 2000, 269.45564978170137, 4.647334255880822],
    [269.45207, 4.69339, -802.803, 10362.542, 2016, 2050, 269.444461397794, 4.791258283864411],
    [359.9995, -10, 900, -300, 2000, 2016, 0.00356172304428458, -10.001333308689178],
    [37.95, 89.26, 198.8, -15, 2000, 2016, 38.018406522600536, 89.25993280593141],
    [
      101.28715, -16.71611, -546.01, -1223.07, 1991.25, 2016, 101.28323037918673,
      -16.724518569109566,
    ],
  ])('moves (%d, %d) by (%d, %d) mas/yr', (raDeg, decDeg, pmRa, pmDec, from, to, ra, dec) => {
    const moved = directionAt(
      entry({ raDeg, decDeg, epochYr: from, pmRaMasYr: pmRa, pmDecMasYr: pmDec }),
      to,
    );
    // Half a milliarcsecond of up to 353 arcsec: Astropy follows light time, ours does not.
    expect(separationArcsec(moved, placed(ra, dec))).toBeLessThan(5e-4);
  });
});

describe('compareEntries', () => {
  // Barnard's star at two epochs (places of Astropy as above): 166 arcsec apart on paper.
  const new2016 = entry({
    raDeg: 269.45207,
    decDeg: 4.69339,
    epochYr: 2016,
    pmRaMasYr: -802.803,
    pmDecMasYr: 10362.542,
    distancePc: 1.8282,
  });
  const old2000 = entry({ raDeg: 269.45565, decDeg: 4.647334, epochYr: 2000, distancePc: 1.83 });

  it('finds a fast star again in a table without proper motions, at that table’s epoch', () => {
    const found = compareEntries(new2016, old2000);
    expect(found?.epochYr).toBe(2000);
    expect(found?.separationArcsec).toBeLessThan(0.01);
    expect(found?.motions).toBe(1);
    expect(found?.distanceRatio).toBeCloseTo(1.83 / 1.8282, 12);
  });

  it('holds places more than 5 arcsec apart, and distances more than 10 % apart, for two stars', () => {
    const at = (decDeg: number, distancePc: number | null) => entry({ decDeg, distancePc });
    expect(compareEntries(at(0, 10), at(4.99 / 3600, 10))).not.toBeNull();
    expect(compareEntries(at(0, 10), at(5.01 / 3600, 10))).toBeNull();
    expect(compareEntries(at(0, 10), at(0, 10.99))).not.toBeNull();
    expect(compareEntries(at(0, 10), at(0, 11.01))).toBeNull();
    expect(compareEntries(at(0, 10), at(0, null))?.distanceRatio).toBeNull();
  });

  it('leaves the fast star of one table apart from a star that stands where it was', () => {
    expect(compareEntries(new2016, { ...old2000, epochYr: 2016 })).toBeNull();
  });
});

describe('findPairs', () => {
  it('finds what comparing every pair finds, near the pole, across 0 h and for fast stars', () => {
    let state = 7;
    const uniform = () => {
      state = (state * 48271) % 2147483647;
      return state / 2147483647;
    };
    const entries: SkyEntry[] = [];
    for (let i = 0; i < 150; i++) {
      const base = entry({
        raDeg: i % 3 === 0 ? (360 + 0.01 * (uniform() - 0.5)) % 360 : uniform() * 360,
        decDeg: i % 5 === 0 ? 89.9 + 0.1 * uniform() : 180 * uniform() - 90,
        epochYr: 2016,
        pmRaMasYr: 20000 * (uniform() - 0.5),
        pmDecMasYr: 20000 * (uniform() - 0.5),
      });
      entries.push(base);
      const [x, y, z] = directionAt(base, 2000);
      entries.push(
        entry({
          raDeg: ((Math.atan2(y, x) * 180) / Math.PI + 360) % 360,
          decDeg: (Math.asin(z) * 180) / Math.PI + (uniform() * 8) / 3600,
        }),
      );
    }
    const slow = entries.flatMap((a, i) =>
      entries.flatMap((b, j) => (j > i && compareEntries(a, b) ? [`${i},${j}`] : [])),
    );
    expect(slow.length).toBeGreaterThan(60);
    expect(findPairs(entries).map(({ first, second }) => `${first},${second}`)).toEqual(slow);
  });

  it('compares two surveys of 5,000 stars cell by cell', () => {
    const survey = (shiftDeg: number) =>
      Array.from({ length: 5000 }, (_, i) =>
        entry({
          raDeg: (i * 137.50776) % 360,
          decDeg: (Math.asin((2 * (i + 0.5)) / 5000 - 1) * 180) / Math.PI + shiftDeg,
          pmRaMasYr: 50,
          pmDecMasYr: -30,
        }),
      );
    const pairs = findPairs([...survey(0), ...survey(1 / 3600)]);
    expect(pairs).toHaveLength(5000);
    expect(pairs.every(({ first, second }) => second === first + 5000)).toBe(true);
  });
});

describe('sigmasApart', () => {
  const stated = (value: number | null, lower: number | null, upper: number | null) => ({
    value,
    lower,
    upper,
    min: null,
    max: null,
  });

  it('takes the errors that face each other', () => {
    // (45 - 24) / hypot(3, 4) = 4.2, by hand.
    expect(sigmasApart(stated(24, 10, 27), stated(45, 41, 90))).toBeCloseTo(4.2, 12);
    expect(sigmasApart(stated(45, 41, 90), stated(24, 10, 27))).toBeCloseTo(4.2, 12);
  });

  it('knows equal values, values without errors, and values that are not there', () => {
    expect(sigmasApart(stated(24, null, null), stated(24, null, null))).toBe(0);
    expect(sigmasApart(stated(24, null, null), stated(25, null, null))).toBe(0);
    expect(sigmasApart(stated(24, null, null), stated(26, null, null))).toBe(Infinity);
    expect(sigmasApart(stated(null, null, null), stated(25, null, null))).toBeNull();
    expect(worstDisagreement([stated(24, 21, 27)])).toBeNull();
  });

  it('reads bounds alone as uniform in the logarithm', () => {
    const bounds = { value: null, lower: null, upper: null, min: 10, max: 1000 };
    // Median 100, 16 % point 10 × 100^0.16 = 20.89, by hand; (100 - 20) / (100 - 20.89).
    expect(sigmasApart(bounds, stated(20, null, null))).toBeCloseTo(80 / (100 - 20.892961), 6);
  });
});
