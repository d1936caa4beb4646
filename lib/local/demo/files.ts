import { writeCsv } from '@/lib/formats';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import { DEMO_SEED, type DemoStar, type DemoSurvey, hostPlaces } from './sky';

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

/**
 * An invented cooling table: magnitudes fall by a fixed slope per decade of mass and rise with age,
 * faster in the bluer band. `shift` makes the second start model fainter while young.
 */
export function coolingFile(shift: number): string {
  const rows: (number | null)[][] = [];
  for (const age of AGES) {
    for (const mass of MASSES) {
      const logMass = Math.log10(mass / 5);
      const logAge = Math.log10(age / 20);
      const late = shift * Math.exp(-age / 60) * Math.max(0, 1 + logMass);
      const h = 15.5 - 5.0 * logMass + 3.2 * logAge + late;
      rows.push([
        age,
        mass,
        Number(h.toFixed(3)),
        Number((h - 0.75 - 0.25 * logAge).toFixed(3)),
        Number((h - 2.3 - 0.75 * logAge + 0.9 * logMass).toFixed(3)),
      ]);
    }
  }
  return table(['age [Myr]', 'mass [Mjup]', 'mag_H [mag]', 'mag_K [mag]', 'mag_L [mag]'], rows);
}

/** Companions of a survey: the two detections, one candidate inside the ranges, some background. */
export function companionsFile(survey: DemoSurvey, stars: DemoStar[]): string {
  const at = (place: { raDeg: number; decDeg: number }) =>
    stars.find((star) => star.raDeg === place.raDeg && star.decDeg === place.decDeg)?.name;
  const rows: (string | number | null)[][] = [];
  const first = at(hostPlaces.first);
  const second = at(hostPlaces.second);
  if (first && survey.slug === 'halyard')
    rows.push([first, 'b', 'confirmed', 6.4, 0.9, 1.2, 41, 5, 7, 1]);
  if (second) rows.push([second, 'b', 'confirmed', 14.6, 1.6, 2.1, 118, 18, 26, 1]);
  const quiet = stars.filter((star) => star.name !== first && star.name !== second);
  if (survey.slug === 'curlew')
    rows.push([quiet[20].name, 'cc1', 'candidate', 8.2, 2.2, 2.9, 165, 30, 40, 0.35]);
  rows.push([quiet[3].name, 'cc1', 'background', null, null, null, null, null, null, 0]);
  if (survey.slug === 'halyard')
    rows.push([quiet[9].name, 'cc1', 'background', null, null, null, null, null, null, 0]);
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
    ],
    rows,
  );
}
