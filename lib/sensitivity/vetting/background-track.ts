import { earthFromBarycentre } from '@/lib/quantities/earth-position';
import type { Offset } from './offsets';

const DEGREE = Math.PI / 180;
const MAS = 1e-3;

/** What moves a star on the sky. */
export interface HostMotion {
  /** ICRS, [deg]. */
  raDeg: number;
  decDeg: number;
  /** Towards east, cos(dec) included, [mas/yr]. */
  pmRaMasYr: number;
  pmDecMasYr: number;
  /** [mas], > 0. */
  parallaxMas: number;
  /** 1 σ, [mas]; 0 where none is known. */
  parallaxErrorMas: number;
}

/**
 * How far a star is moved by one unit of parallax at an epoch: F_α cos δ = X sin α − Y cos α and
 * F_δ = X cos α sin δ + Y sin α sin δ − Z cos δ, with X, Y, Z the Earth from the barycentre [au].
 *
 * @param raDeg ICRS, [deg]
 * @param decDeg ICRS, [deg]
 * @param julianYear 1950 to 2050
 * @returns towards east and north, in units of the parallax
 * @throws RangeError for a year outside
 * Accuracy: 4e-4, that of the Earth's place.
 * @source Explanatory Supplement to the Astronomical Almanac, chapter on stellar places
 */
export function parallaxFactors(
  raDeg: number,
  decDeg: number,
  julianYear: number,
): { east: number; north: number } {
  const { x, y, z } = earthFromBarycentre(julianYear);
  const [ra, dec] = [raDeg * DEGREE, decDeg * DEGREE];
  return {
    east: x * Math.sin(ra) - y * Math.cos(ra),
    north: (x * Math.cos(ra) + y * Math.sin(ra)) * Math.sin(dec) - z * Math.cos(dec),
  };
}

/**
 * Where a source without proper motion and parallax goes, seen from the star: the star's own motion
 * with the opposite sign.
 *
 * Straight lines on the tangent plane: no perspective, no change of the direction of north. For a
 * path of 3 arcsec at 76° from the equator that is 0.4 mas, elsewhere less.
 *
 * @param host the star
 * @param fromYear epoch of the reference, Julian year
 * @param toYear epoch asked for, Julian year
 * @returns shift between the two, [arcsec]
 * @throws RangeError for a year outside 1950 to 2050, or a parallax that is not > 0
 */
export function backgroundShift(host: HostMotion, fromYear: number, toYear: number): Offset {
  requireMotion(host);
  const factors = factorChange(host, fromYear, toYear);
  const years = toYear - fromYear;
  return {
    eastArcsec: -MAS * (host.pmRaMasYr * years + host.parallaxMas * factors.east),
    northArcsec: -MAS * (host.pmDecMasYr * years + host.parallaxMas * factors.north),
  };
}

/** Change of the parallax factors between two epochs. */
export function factorChange(
  { raDeg, decDeg }: Pick<HostMotion, 'raDeg' | 'decDeg'>,
  fromYear: number,
  toYear: number,
): { east: number; north: number } {
  const from = parallaxFactors(raDeg, decDeg, fromYear);
  const to = parallaxFactors(raDeg, decDeg, toYear);
  return { east: to.east - from.east, north: to.north - from.north };
}

function requireMotion(host: HostMotion): void {
  for (const [name, value] of Object.entries(host)) {
    if (!Number.isFinite(value)) throw new RangeError(`${name} must be finite, got ${value}`);
  }
  if (!(host.parallaxMas > 0)) {
    throw new RangeError(`parallaxMas must be > 0, got ${host.parallaxMas}`);
  }
  if (!(Math.abs(host.decDeg) <= 90)) {
    throw new RangeError(`decDeg must be between -90 and 90, got ${host.decDeg}`);
  }
  if (!(host.parallaxErrorMas >= 0)) {
    throw new RangeError(`parallaxErrorMas must be >= 0, got ${host.parallaxErrorMas}`);
  }
}

/**
 * The track between two epochs for drawing, at least so many points a year that its loops show.
 *
 * @param host the star
 * @param start place at the first epoch, [arcsec]
 * @param fromYear Julian year of the start
 * @param toYear last Julian year
 * @returns points in order of time, the start first
 */
export function backgroundTrack(
  host: HostMotion,
  start: Offset,
  fromYear: number,
  toYear: number,
): { julianYear: number; eastArcsec: number; northArcsec: number }[] {
  const steps = Math.min(600, Math.max(2, Math.ceil((toYear - fromYear) * 24)));
  return Array.from({ length: steps + 1 }, (_, i) => {
    const julianYear = fromYear + ((toYear - fromYear) * i) / steps;
    const shift = backgroundShift(host, fromYear, julianYear);
    return {
      julianYear,
      eastArcsec: start.eastArcsec + shift.eastArcsec,
      northArcsec: start.northArcsec + shift.northArcsec,
    };
  });
}
