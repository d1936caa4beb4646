import { describe, expect, it } from 'vitest';
import {
  backgroundShift,
  backgroundTrack,
  type HostMotion,
  type MeasuredOffset,
  offsetOf,
  polarOf,
  testMotion,
} from '@/lib/sensitivity/vetting';

/**
 * Separation [arcsec] and position angle [deg] of a source at infinity from a moving star: SkyCoord
 * with apply_space_motion from 2016.0, the Earth from the built-in ephemeris, Astropy 5.2.1. The
 * first row is the starting place.
 */
const ASTROPY: { host: Omit<HostMotion, 'parallaxErrorMas'>; rows: [number, number, number][] }[] =
  [
    {
      host: { raDeg: 309.35, decDeg: -8.3, pmRaMasYr: 85.2, pmDecMasYr: -61.7, parallaxMas: 21.5 },
      rows: [
        [2015.62, 0.842, 37.3],
        [2016.1, 0.841365, 33.1464],
        [2017.55, 0.855629, 23.18893],
        [2019.3, 0.910388, 10.78535],
      ],
    },
    {
      host: { raDeg: 156.1, decDeg: 4.79, pmRaMasYr: -210.4, pmDecMasYr: 35.9, parallaxMas: 64 },
      rows: [
        [2020.21, 1.31, 251],
        [2020.7, 1.255371, 249.5235],
        [2022.95, 0.892875, 236.13005],
        [2024.11, 0.715084, 219.46505],
      ],
    },
    {
      host: { raDeg: 82, decDeg: -76.5, pmRaMasYr: 12.3, pmDecMasYr: 318, parallaxMas: 101 },
      rows: [
        [2009.9, 2.45, 118.6],
        [2011.35, 2.867898, 129.14214],
        [2013, 3.065266, 134.77841],
        [2016.4, 4.038928, 148.11209],
      ],
    },
  ];

const epoch = (
  julianYear: number,
  separationArcsec: number,
  positionAngleDeg: number,
  errors: [number, number] = [0.004, 0.3],
): MeasuredOffset => ({
  julianYear,
  separationArcsec,
  positionAngleDeg,
  separationErrorArcsec: errors[0],
  positionAngleErrorDeg: errors[1],
});

const hostOf = (index: number): HostMotion => ({ ...ASTROPY[index].host, parallaxErrorMas: 0 });

describe('backgroundShift', () => {
  it.each(ASTROPY.map((sample, index) => [index, sample] as const))(
    'follows Astropy to half a milliarcsecond, star %d',
    (index, { rows }) => {
      const [from, separationArcsec, positionAngleDeg] = rows[0];
      const start = offsetOf({ separationArcsec, positionAngleDeg });
      for (const [year, separation, angle] of rows) {
        const shift = backgroundShift(hostOf(index), from, year);
        const seen = offsetOf({ separationArcsec: separation, positionAngleDeg: angle });
        const east = start.eastArcsec + shift.eastArcsec - seen.eastArcsec;
        const north = start.northArcsec + shift.northArcsec - seen.northArcsec;
        expect(Math.hypot(east, north)).toBeLessThan(5e-4);
      }
    },
  );

  it('draws a track that begins at the reference and ends at the shift', () => {
    const start = { eastArcsec: 0.5, northArcsec: -0.2 };
    const track = backgroundTrack(hostOf(0), start, 2015, 2018);
    expect(track[0]).toEqual({ julianYear: 2015, ...start });
    const end = backgroundShift(hostOf(0), 2015, 2018);
    const last = track[track.length - 1];
    expect(last.eastArcsec).toBeCloseTo(start.eastArcsec + end.eastArcsec, 12);
    expect(last.northArcsec).toBeCloseTo(start.northArcsec + end.northArcsec, 12);
  });

  it('refuses a star without parallax', () => {
    const host = { ...hostOf(0), parallaxMas: 0 };
    expect(() => backgroundShift(host, 2015, 2016)).toThrow('parallaxMas must be > 0');
  });
});

describe('offsets', () => {
  it('go from east of north and back', () => {
    const polar = { separationArcsec: 1.2, positionAngleDeg: 251 };
    const back = polarOf(offsetOf(polar));
    expect(back.separationArcsec).toBeCloseTo(1.2, 12);
    expect(back.positionAngleDeg).toBeCloseTo(251, 10);
  });
});

describe('testMotion', () => {
  const moving = ASTROPY[0].rows.map(([year, s, pa]) => epoch(year, s, pa));
  const still = ASTROPY[0].rows.map(([year]) => epoch(year, 0.842, 37.3));

  it('takes a source on the track for background and for nothing else', () => {
    const background = testMotion(hostOf(0), moving, 'background');
    const bound = testMotion(hostOf(0), moving, 'common-proper-motion');
    expect(background.degreesOfFreedom).toBe(6);
    expect(background.chiSquared).toBeLessThan(0.1);
    expect(background.probability).toBeGreaterThan(0.99);
    expect(bound.probability).toBeLessThan(1e-9);
    expect(bound.sigmas[3]).toBeGreaterThan(20);
  });

  it('takes a source that keeps its place for one that moves with the star', () => {
    const bound = testMotion(hostOf(0), still, 'common-proper-motion');
    const background = testMotion(hostOf(0), [...still].reverse(), 'background');
    expect(bound.chiSquared).toBe(0);
    expect(bound.sigmas).toEqual([0, 0, 0, 0]);
    expect(background.probability).toBeLessThan(1e-9);
    expect(background.predicted[0]).toEqual(bound.predicted[0]);
  });

  it('counts the error of the reference at each epoch, once', () => {
    // Due north, equal errors: 12 mas east after errors of 5 and 5 mas: 144 / 50.
    const degrees = (0.005 / 1) * (180 / Math.PI);
    const errors: [number, number] = [0.005, degrees];
    const shifted = polarOf({ eastArcsec: 0.012, northArcsec: 1 });
    const two = [
      epoch(2015, 1, 0, errors),
      epoch(2017, shifted.separationArcsec, shifted.positionAngleDeg, [
        0.005,
        degrees / shifted.separationArcsec,
      ]),
    ];
    const fit = testMotion(hostOf(0), two, 'common-proper-motion');
    expect(fit.chiSquared).toBeCloseTo(144 / 50, 6);
    expect(fit.sigmas[1]).toBeCloseTo(Math.sqrt(144 / 50), 6);
    // A chi-squared of 2 degrees of freedom has the tail exp(-x/2).
    expect(fit.probability).toBeCloseTo(Math.exp(-144 / 100), 6);
    // Two later epochs at the same place, 12 mas off: mean of two against one, 144 / (25 + 12.5).
    const three = testMotion(
      hostOf(0),
      [...two, { ...two[1], julianYear: 2018 }],
      'common-proper-motion',
    );
    expect(three.chiSquared).toBeCloseTo(144 / 37.5, 6);
    expect(three.degreesOfFreedom).toBe(4);
  });

  it('forgives a background source what the parallax does not know', () => {
    const off = moving.map((one) => ({ ...one }));
    const host = { ...hostOf(0), parallaxMas: 31.5 };
    const strict = testMotion(host, off, 'background');
    const loose = testMotion({ ...host, parallaxErrorMas: 10 }, off, 'background');
    expect(loose.chiSquared).toBeLessThan(strict.chiSquared);
    expect(loose.probability).toBeGreaterThan(strict.probability);
  });

  it('refuses one epoch, and errors that are not there', () => {
    expect(() => testMotion(hostOf(0), moving.slice(0, 1), 'background')).toThrow('at least 2');
    const bare = [moving[0], { ...moving[1], separationErrorArcsec: 0 }];
    expect(() => testMotion(hostOf(0), bare, 'background')).toThrow('separationErrorArcsec');
  });
});
