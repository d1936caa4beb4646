/** A star's place on the sky as one table gives it. */
export interface SkyEntry {
  /** ICRS, at `epochYr`. */
  raDeg: number;
  decDeg: number;
  /** Julian year. */
  epochYr: number;
  /** Includes cos(dec); null where the table gives no proper motion. */
  pmRaMasYr: number | null;
  pmDecMasYr: number | null;
  distancePc: number | null;
}

/** Two entries that may be one star. */
export interface SkyPair {
  /** Indices of the entries, first < second. */
  first: number;
  second: number;
  /** At the common epoch. */
  separationArcsec: number;
  /** Julian year at which the two places were compared. */
  epochYr: number;
  /** Larger over smaller distance; null where a distance is not known. */
  distanceRatio: number | null;
  /** How many of the two have a proper motion. */
  motions: 0 | 1 | 2;
}

type Direction = [x: number, y: number, z: number];

/** Our rule: one star may be listed at places so far apart … */
export const MATCH_ARCSEC = 5;
/** … and at distances that differ by this factor. */
export const MATCH_DISTANCE_RATIO = 1.1;

const DEG = Math.PI / 180;
const ARCSEC = DEG / 3600;
const MAS = ARCSEC / 1000;
const REFERENCE_YR = 2000;
/** Wide enough that most stars touch few cells. */
const CELL = 200 * ARCSEC;

const hasMotion = ({ pmRaMasYr, pmDecMasYr }: SkyEntry) =>
  pmRaMasYr !== null && pmDecMasYr !== null;

/**
 * Unit vector to a star at another epoch, moved along a straight line in space without radial
 * motion; without a proper motion it stays where it is.
 *
 * @param epochYr Julian year
 */
export function directionAt(entry: SkyEntry, epochYr: number): Direction {
  const { raDeg, decDeg, pmRaMasYr, pmDecMasYr } = entry;
  const [sinRa, cosRa] = [Math.sin(raDeg * DEG), Math.cos(raDeg * DEG)];
  const [sinDec, cosDec] = [Math.sin(decDeg * DEG), Math.cos(decDeg * DEG)];
  const years = epochYr - entry.epochYr;
  const east = (pmRaMasYr ?? 0) * MAS * (hasMotion(entry) ? years : 0);
  const north = (pmDecMasYr ?? 0) * MAS * (hasMotion(entry) ? years : 0);
  const x = cosDec * cosRa - east * sinRa - north * sinDec * cosRa;
  const y = cosDec * sinRa + east * cosRa - north * sinDec * sinRa;
  const z = sinDec + north * cosDec;
  const length = Math.hypot(x, y, z);
  return [x / length, y / length, z / length];
}

/**
 * Angle between two directions [arcsec], accurate at any size.
 *
 * @param a unit vector
 * @param b unit vector
 */
export function separationArcsec(a: Direction, b: Direction): number {
  const cross = Math.hypot(
    a[1] * b[2] - a[2] * b[1],
    a[2] * b[0] - a[0] * b[2],
    a[0] * b[1] - a[1] * b[0],
  );
  return Math.atan2(cross, a[0] * b[0] + a[1] * b[1] + a[2] * b[2]) / ARCSEC;
}

/** A place without motion holds at its own epoch only; two with motion meet at the later one. */
function commonEpoch(a: SkyEntry, b: SkyEntry): number {
  if (!hasMotion(a)) return a.epochYr;
  if (!hasMotion(b)) return b.epochYr;
  return Math.max(a.epochYr, b.epochYr);
}

/**
 * Compares two places at a common epoch after proper motion.
 *
 * @source our rule: within 5″, and distances within 10 % where both are known
 * @returns null where the two cannot be one star by the rule
 */
export function compareEntries(a: SkyEntry, b: SkyEntry): Omit<SkyPair, 'first' | 'second'> | null {
  const epochYr = commonEpoch(a, b);
  const apart = separationArcsec(directionAt(a, epochYr), directionAt(b, epochYr));
  if (apart > MATCH_ARCSEC) return null;
  const distanceRatio =
    a.distancePc === null || b.distancePc === null
      ? null
      : Math.max(a.distancePc, b.distancePc) / Math.min(a.distancePc, b.distancePc);
  if (distanceRatio !== null && distanceRatio > MATCH_DISTANCE_RATIO) return null;
  const motions = (Number(hasMotion(a)) + Number(hasMotion(b))) as SkyPair['motions'];
  return { separationArcsec: apart, epochYr, distanceRatio, motions };
}

/** Cells of a cubic lattice that a ball around a place touches: as far as the star moves. */
function* cellsOf(entry: SkyEntry, longestYr: number): Generator<string> {
  const speedArcsecYr = Math.hypot(entry.pmRaMasYr ?? 0, entry.pmDecMasYr ?? 0) / 1000;
  const radius = (MATCH_ARCSEC / 2 + speedArcsecYr * longestYr) * ARCSEC * (1 + 1e-6);
  const range = directionAt(entry, REFERENCE_YR).map((value) => [
    Math.floor((value - radius) / CELL),
    Math.floor((value + radius) / CELL),
  ]);
  for (let i = range[0][0]; i <= range[0][1]; i++) {
    for (let j = range[1][0]; j <= range[1][1]; j++) {
      for (let k = range[2][0]; k <= range[2][1]; k++) yield `${i},${j},${k}`;
    }
  }
}

/**
 * All pairs of entries that may be one star, in the order of their indices. Two balls that touch
 * share a cell, so only entries of one cell are compared: time grows with the number of entries.
 *
 * @param entries shape [entry]
 * @source our rule, see compareEntries
 */
export function findPairs(entries: readonly SkyEntry[]): SkyPair[] {
  const longestYr = entries.reduce(
    (most, { epochYr }) => Math.max(most, Math.abs(epochYr - REFERENCE_YR)),
    0,
  );
  const members = new Map<string, number[]>();
  const pairs = new Map<string, SkyPair>();
  entries.forEach((entry, second) => {
    for (const cell of cellsOf(entry, longestYr)) {
      const known = members.get(cell);
      if (!known) {
        members.set(cell, [second]);
        continue;
      }
      for (const first of known) {
        const key = `${first},${second}`;
        if (pairs.has(key)) continue;
        const found = compareEntries(entries[first], entry);
        if (found) pairs.set(key, { first, second, ...found });
      }
      known.push(second);
    }
  });
  return [...pairs.values()].sort((a, b) => a.first - b.first || a.second - b.second);
}
