import { writeCsv } from '@/lib/formats';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import { directionAt } from '@/lib/quantities/sky-match';
import type { AgeLaw, StarInputs } from '@/lib/sensitivity';
import { BAND, inventStar } from '@/tests/bench/survey';

const SEED = 'invented sky 1';
const DEG = Math.PI / 180;
const GAIA_EPOCH = 2016;
const OLD_EPOCH = 2000;

/** How a survey lists a star that an earlier one lists too. */
export type Listing = 'gaia' | 'name' | 'position';

export interface Entry {
  star: number;
  /** What ties it to an earlier entry; null where it is the first. */
  by: Listing | null;
}

export interface InventedSurvey {
  name: string;
  slug: string;
  entries: Entry[];
}

const range = (from: number, to: number) => Array.from({ length: to - from }, (_, i) => from + i);

/** Pairs that only the place on the sky gives away, to be confirmed by a person. */
const BY_POSITION = 50;

/**
 * Three surveys of 500, 400 and 300 targets with 1000 distinct stars: 200 entries are of stars that
 * an earlier survey lists, found by Gaia number, by another name, or by position alone.
 *
 * @param scale share of the numbers, for trying out
 */
export function threeSurveys(scale = 1): InventedSurvey[] {
  const n = (count: number) => Math.round(count * scale);
  const fresh = (from: number, to: number): Entry[] =>
    range(n(from), n(to)).map((star) => ({ star, by: null }));
  const again = (from: number, to: number): Entry[] =>
    range(n(from), n(to)).map((star, i) => ({ star, by: i % 2 === 0 ? 'gaia' : 'name' }));
  const third: Entry[] = [...again(0, 50), ...again(500, 550)].map((entry, i, all) =>
    i >= all.length - Math.min(BY_POSITION, n(50)) ? { ...entry, by: 'position' } : entry,
  );
  return [
    { name: 'GULL', slug: 'gull', entries: fresh(0, 500) },
    { name: 'TERN', slug: 'tern', entries: [...again(0, 100), ...fresh(500, 800)] },
    { name: 'SKUA', slug: 'skua', entries: [...third, ...fresh(800, 1000)] },
  ];
}

/** Entries whose star only a person can tell. */
export const pairsByPosition = (surveys: InventedSurvey[]) =>
  surveys.flatMap(({ entries }) => entries.filter(({ by }) => by === 'position')).length;

/** One survey of so many stars, each new. */
export function oneSurvey(name: string, stars: number): InventedSurvey {
  const entries = range(0, stars).map((index): Entry => ({ star: 100_000 + index, by: null }));
  return { name, slug: name.toLowerCase(), entries };
}

const fixed = (value: number, digits: number) => Number(value.toFixed(digits));

/** Place and motion of a star at the epoch of Gaia, the same in every survey. */
function placeOf(star: number) {
  const { uniform, normal } = createRandom(deriveSeed(SEED, `place ${star}`));
  return {
    raDeg: fixed(360 * uniform(), 7),
    decDeg: fixed(Math.asin(2 * uniform() - 1) / DEG, 7),
    pmRaMasYr: fixed(60 * normal(), 3),
    pmDecMasYr: fixed(60 * normal(), 3),
  };
}

/** The same star as an old list has it: moved back, and off by some tenths of an arcsecond. */
function oldPlaceOf(star: number) {
  const { normal } = createRandom(deriveSeed(SEED, `old ${star}`));
  const place = placeOf(star);
  const [x, y, z] = directionAt({ ...place, epochYr: GAIA_EPOCH, distancePc: null }, OLD_EPOCH);
  const decDeg = Math.asin(z) / DEG;
  const raDeg = (Math.atan2(y, x) / DEG + 360) % 360;
  return {
    ...place,
    raDeg: fixed(raDeg + (0.2 * normal()) / 3600 / Math.cos(decDeg * DEG), 6),
    decDeg: fixed(decDeg + (0.2 * normal()) / 3600, 6),
  };
}

const baseName = (star: number) => `IS ${String(star + 1).padStart(6, '0')}`;

function nameIn(survey: InventedSurvey, { star, by }: Entry): string {
  return by === null ? baseName(star) : `${survey.name} ${star + 1}`;
}

type InventedStar = StarInputs & {
  age: AgeLaw;
  distance: { distancePc: number; errorPc: number };
};

const gaiaOf = (star: number) => String(4_000_000_000_000_000_000n + 7919n * BigInt(star + 1));

/** So that six standard errors stay within the ages of the demonstration's cooling tables. */
const TABLE_MYR = { min: 1, max: 4000 };
const widestSpread = (medianMyr: number) =>
  Math.min(medianMyr / TABLE_MYR.min, TABLE_MYR.max / medianMyr) ** (1 / 6);

export function targetsFile(survey: InventedSurvey): string {
  const rows = survey.entries.map((entry) => {
    const { star, by } = entry;
    const { hostMag, age, distance } = inventStar(star) as InventedStar;
    const isOld = by === 'position';
    const place = isOld ? oldPlaceOf(star) : placeOf(star);
    const { medianMyr } = age;
    const spread = Math.min((age.upperMyr ?? medianMyr) / medianMyr, widestSpread(medianMyr));
    const [lowerMyr, upperMyr] = [medianMyr / spread, medianMyr * spread];
    return {
      name: nameIn(survey, entry),
      other_names: by === 'name' ? baseName(star) : null,
      gaia_dr3_id: by === null || by === 'gaia' ? gaiaOf(star) : null,
      'ra [deg]': place.raDeg,
      'dec [deg]': place.decDeg,
      ref_epoch: isOld ? OLD_EPOCH : GAIA_EPOCH,
      'pmra [mas/yr]': place.pmRaMasYr,
      'pmdec [mas/yr]': place.pmDecMasYr,
      'distance [pc]': fixed(distance.distancePc, 4),
      'distance_error [pc]': fixed(distance.errorPc, 4),
      'age [Myr]': fixed(medianMyr, 3),
      'age_error_lower [Myr]': fixed(medianMyr - lowerMyr, 3),
      'age_error_upper [Myr]': fixed(upperMyr - medianMyr, 3),
      [`mag_${BAND} [mag]`]: fixed(hostMag, 3),
    };
  });
  return asCsv(rows);
}

/** @param points of each curve, at most what the invented one has */
export function curvesFile(survey: InventedSurvey, points: number): string {
  const rows = survey.entries.flatMap((entry, i) => {
    // A curve of its own for each survey and star.
    const [curve] = inventStar(entry.star + 1_000_000 * (survey.slug.length + i)).curves;
    const every = (curve.separationArcsec.length - 1) / (points - 1);
    return range(0, points).map((k) => {
      const at = Math.round(k * Math.max(1, every));
      const last = curve.separationArcsec.length - 1;
      const index = Math.min(at, last);
      return {
        target: nameIn(survey, entry),
        'separation [arcsec]': fixed(
          // Curves with fewer points than asked for go on outwards.
          curve.separationArcsec[index] * 1.05 ** Math.max(0, at - last),
          5,
        ),
        'contrast [mag]': fixed(curve.contrastMag[index], 3),
        band: BAND,
        epoch: '2019-03-14',
      };
    });
  });
  return asCsv(rows);
}

function asCsv(rows: Record<string, string | number | null>[]): string {
  return writeCsv(
    Object.keys(rows[0]).map((name) => ({ name, values: rows.map((row) => row[name]) })),
  );
}
