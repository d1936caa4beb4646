import { writeCsv } from '@/lib/formats';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import type { DemoCompanion } from './companions';
import { inventedMagnitude } from './cooling';
import { motionOf } from './epochs';
import { DEMO_SEED, type DemoStar, type DemoSurvey } from './sky';

type Column = Parameters<typeof writeCsv>[0][number];

function table(headings: string[], rows: (string | number | null)[][]): string {
  const columns: Column[] = headings.map((name, i) => ({
    name,
    values: rows.map((row) => row[i]),
  }));
  return writeCsv(columns);
}

/** The targets file of one survey. Two stars state no age error, as real lists do. */
export function targetsFile(survey: DemoSurvey, stars: DemoStar[]): string {
  const rows = stars.map((star, i) => [
    star.name,
    star.gaiaDr3Id,
    star.raDeg,
    star.decDeg,
    motionOf(star).pmRaMasYr,
    motionOf(star).pmDecMasYr,
    star.distancePc,
    star.distanceErrorPc,
    star.ageMyr,
    survey.slug === 'halyard' && i === 11 ? null : star.ageErrorMyr,
    star.hostMassMsun,
    star.spectralType,
    star.group,
    star.apparent[survey.band],
  ]);
  return table(
    [
      'name',
      'gaia_dr3_id',
      'ra [deg]',
      'dec [deg]',
      'pmra [mas/yr]',
      'pmdec [mas/yr]',
      'distance [pc]',
      'distance_error [pc]',
      'age [Myr]',
      'age_error [Myr]',
      'mass [solMass]',
      'spectral_type',
      'moving_group',
      `mag_${survey.band} [mag]`,
    ],
    rows,
  );
}

const POINTS = 32;

/** Contrast rises steeply from the inner edge and levels off; bright stars reach deeper. */
function contrastAt(survey: DemoSurvey, separation: number, depth: number, turn: number): number {
  const floor = survey.floorMag + depth;
  const inner = floor - 5.6;
  const x = Math.log(separation / survey.innerArcsec) / Math.log(turn / survey.innerArcsec);
  return inner + (floor - inner) * (1 - Math.exp(-2.6 * Math.max(0, x))) * 1.02;
}

export function curvesFile(survey: DemoSurvey, stars: DemoStar[]): string {
  const rows: (string | number | null)[][] = [];
  for (const star of stars) {
    const random = createRandom(deriveSeed(DEMO_SEED, `curve ${survey.slug} ${star.name}`));
    const depth = 0.55 * random.normal() - 0.35 * Math.max(0, star.apparent[survey.band] - 7);
    const turn = 0.75 * Math.exp(0.18 * random.normal());
    const wave = 0.12 * random.uniform();
    const phase = 6.28 * random.uniform();
    const year = survey.from + Math.floor((survey.to - survey.from + 1) * random.uniform());
    const epoch = `${year}-${String(1 + Math.floor(12 * random.uniform())).padStart(2, '0')}-${String(1 + Math.floor(28 * random.uniform())).padStart(2, '0')}`;
    const step = Math.log(survey.outerArcsec / survey.innerArcsec) / (POINTS - 1);
    for (let i = 0; i < POINTS; i++) {
      const separation = survey.innerArcsec * Math.exp(step * i);
      const ripple = wave * Math.sin(phase + 1.7 * i);
      rows.push([
        star.name,
        Number(separation.toPrecision(5)),
        Number((contrastAt(survey, separation, depth, turn) + ripple).toFixed(3)),
        survey.band,
        epoch,
      ]);
    }
  }
  return table(['target', 'separation [arcsec]', 'contrast [mag]', 'band', 'epoch'], rows);
}

const MASSES = [0.3, 0.5, 0.8, 1, 1.5, 2, 3, 4, 5, 6, 8, 10, 13, 16, 20, 25, 32, 40, 50, 65, 80];
const AGES = [
  1, 2, 3, 5, 7, 10, 14, 20, 30, 45, 65, 100, 150, 220, 320, 500, 800, 1300, 2200, 4000,
];

/** An invented cooling table; `shift` makes the second start model fainter while young. */
export function coolingFile(shift: number): string {
  const rows: (number | null)[][] = [];
  for (const age of AGES) {
    for (const mass of MASSES) {
      const of = (band: 'H' | 'K' | 'L') =>
        Number(inventedMagnitude(mass, age, band, shift).toFixed(3));
      rows.push([age, mass, of('H'), of('K'), of('L')]);
    }
  }
  return table(['age [Myr]', 'mass [Mjup]', 'mag_H [mag]', 'mag_K [mag]', 'mag_L [mag]'], rows);
}

/** The companions file of one survey; of each source it holds the first epoch. */
export function companionsFile(companions: DemoCompanion[]): string {
  const rows = companions.map(({ epochs: [first], ...one }) => [
    one.star,
    one.name,
    one.status,
    ...(one.mass ?? [null, null, null]),
    ...(one.axis ?? [null, null, null]),
    one.probability,
    first.observedOn,
    first.separationArcsec,
    first.separationErrorArcsec,
    first.positionAngleDeg,
    first.positionAngleErrorDeg,
    first.contrastMag,
    first.contrastErrorMag,
    first.band,
  ]);
  return table(
    [
      'target',
      'companion',
      'status',
      'mass [Mjup]',
      'mass_error_lower',
      'mass_error_upper',
      'semi_major_axis [AU]',
      'semi_major_axis_error_lower',
      'semi_major_axis_error_upper',
      'probability',
      'epoch',
      'separation [arcsec]',
      'separation_error',
      'position_angle [deg]',
      'position_angle_error',
      'contrast [mag]',
      'contrast_error [mag]',
      'band',
    ],
    rows,
  );
}
