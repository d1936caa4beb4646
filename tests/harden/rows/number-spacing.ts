import { type Likelihood, ratePosterior, upperLimit } from '@/lib/inference';
import { logSpacedAxis, unionAxis } from '@/lib/numerics/grid';
import { meanCompleteness, type PowerLawPopulation, populationWeights } from '@/lib/population';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import { computeCompletenessMap, type MapGrid, regridNodes } from '@/lib/sensitivity';
import { COOLING, inventStars, POPULATION, settings } from '@/tests/bench/survey';
import type { Bench, Measured, Row } from '../row';

const STARS = 200;
const FOUND = [0, 3];
const MOST = 0.005;

/** The laboratory's usual grid, at nodes that are `finer` times as close. */
function gridOf(finer: number): MapGrid {
  const { massMjup: mass, semiMajorAxisAu: axis } = mapSettingsSchema.parse({});
  const count = (one: { count: number }) => finer * (one.count - 1) + 1;
  return {
    massMjup: logSpacedAxis(mass.min, mass.max, count(mass)),
    semiMajorAxisAu: logSpacedAxis(axis.min, axis.max, count(axis)),
  };
}

/** Another survey's nodes, about as close: none but the ends fall on the usual ones. */
const OTHER: MapGrid = {
  massMjup: logSpacedAxis(0.5, 80, 59),
  semiMajorAxisAu: logSpacedAxis(1, 1000, 67),
};

const BOXES: [string, Partial<PowerLawPopulation>][] = [
  ['as the benchmark', {}],
  ['wide orbits', { semiMajorAxisMinAu: 80, semiMajorAxisMaxAu: 800 }],
  ['close orbits', { semiMajorAxisMinAu: 8, semiMajorAxisMaxAu: 60 }],
  [
    'narrow box',
    { massMinMjup: 4.1, massMaxMjup: 6.3, semiMajorAxisMinAu: 33, semiMajorAxisMaxAu: 71 },
  ],
  ['light planets', { massMinMjup: 1, massMaxMjup: 10, massIndex: -1.5 }],
  ['flat in both', { massIndex: 0, semiMajorAxisIndex: 0 }],
];

/** Limits of every box, likelihood and count from maps of each star on a grid. */
function limitsOf(maps: Float64Array[], grid: MapGrid): Map<string, number> {
  const limits = new Map<string, number>();
  for (const [box, change] of BOXES) {
    const weights = populationWeights(grid, { ...POPULATION, ...change });
    const completeness = Float64Array.from(maps, (map) => meanCompleteness(map, weights));
    for (const likelihood of ['host-fraction', 'mean-number'] as Likelihood[]) {
      for (const count of FOUND) {
        const detectedStars = [...completeness.keys()].filter((star) => completeness[star] > 0.05);
        const posterior = ratePosterior({
          likelihood,
          completeness,
          detectedStars: detectedStars.slice(0, count),
          prior: { law: 'uniform', max: 1 },
        });
        limits.set(`${box}, ${likelihood}, ${count} found`, upperLimit(posterior, 0.95));
      }
    }
  }
  return limits;
}

interface Move {
  name: string;
  share: number;
}

function largestMove(from: Map<string, number>, to: Map<string, number>): Move {
  return [...from]
    .map(([name, limit]) => ({ name, share: Math.abs((to.get(name) ?? Number.NaN) / limit - 1) }))
    .reduce((most, one) => (one.share <= most.share ? most : one));
}

async function measure({ say }: Bench): Promise<Measured> {
  const stars = inventStars(STARS);
  const mapsOn = (grid: MapGrid) =>
    stars.map(
      (star) => computeCompletenessMap(star, COOLING, grid, settings('smooth')).map.completeness,
    );
  const [usual, half] = [gridOf(1), gridOf(2)];
  const [onUsual, onHalf] = [mapsOn(usual), mapsOn(half)];
  const both: MapGrid = {
    massMjup: unionAxis([OTHER.massMjup, usual.massMjup]),
    semiMajorAxisAu: unionAxis([OTHER.semiMajorAxisAu, usual.semiMajorAxisAu]),
  };
  const regridded = (maps: Float64Array[], from: MapGrid, to: MapGrid) =>
    maps.map((completeness) => regridNodes({ ...from, completeness }, to).map.completeness);
  const limits = limitsOf(onUsual, usual);
  const moves = {
    'spacing halved': largestMove(limits, limitsOf(onHalf, half)),
    'regridded to half the spacing': largestMove(
      limits,
      limitsOf(regridded(onUsual, usual, half), half),
    ),
    'maps of another grid on the nodes of both': largestMove(
      limits,
      limitsOf(regridded(mapsOn(OTHER), OTHER, both), both),
    ),
  };
  const percent = (share: number) => `${(100 * share).toPrecision(2)} %`;
  const words = Object.entries(moves).map(([what, { share }]) => `${what} ${percent(share)}`);
  for (const [what, { name, share }] of Object.entries(moves))
    say(`${what}: ${percent(share)} at ${name}`);
  return {
    isMet: Object.values(moves).every(({ share }) => share < MOST),
    figure: `${limits.size} limits over ${STARS} stars move by at most: ${words.join(', ')}`,
    details: { moves, limits: Object.fromEntries(limits) },
  };
}

export const row: Row = {
  name: 'number-spacing',
  what: 'N8: limits from maps with half the spacing of nodes, and from maps that share a run with those of another grid',
  goal: `no limit moves by ${100 * MOST} %`,
  measure,
};
