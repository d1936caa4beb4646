import type { DrawnCompanions } from '@/components/charts/companion-scatter';
import type { MapData } from '@/components/charts/map-contours';
import { orNull } from '@/components/runs/live-answer';
import type { LiveSample } from '@/components/runs/live-sample';
import { type Answer, answerFromView, type PopulationView, viewPopulation } from '@/lib/inference';
import {
  drawCompanions,
  type Population,
  type PopulationWeights,
  requireHostMasses,
} from '@/lib/population';
import type { PreviewSetting } from './builder-setting';
import { interpolateMap } from './interpolate-map';
import {
  definitionOf,
  type LawDefinition,
  type LawParameter,
  partsOf,
  withParameter,
} from './law-parts';
import { hostMassesOf, type Spread, spreadOf } from './spread';

export const PLANETS = 240;
/** Below this mean detection probability a limit rests on the population and not on data. */
export const HARDLY_SEEN = 0.05;
/** So many companions of a table are shown one by one; of a longer one, drawn ones. */
export const MOST_SHOWN = 480;

/** One number between 0 and 1 a planet, always the same: a dragged range must not flicker. */
const chances = Float64Array.from(
  { length: MOST_SHOWN },
  (_, i) => ((i + 1) * 0.6180339887498949) % 1,
);

/**
 * Planets of the population; each is seen with the mean completeness at its place, or, where the
 * masses are those of the star, with that of a star's own map.
 *
 * @param hosts stars on which planets of a mass ratio are placed; one of 1 solar mass without it
 */
export function drawSeen(
  population: Population,
  map: MapData | undefined,
  hosts?: { sample: LiveSample; spread: Spread },
): DrawnCompanions {
  if (population.form === 'systems' && population.massMjup.length <= MOST_SHOWN) {
    const { massMjup, semiMajorAxisAu } = population;
    return seeOn(map, {
      massMjup: Float64Array.from(massMjup),
      semiMajorAxisAu: Float64Array.from(semiMajorAxisAu),
    });
  }
  if (population.form !== 'mass-ratio') {
    return seeOn(map, drawCompanions(population, PLANETS, 'preview'));
  }
  if (!hosts) {
    const suns = new Float64Array(PLANETS).fill(1);
    return seeOn(map, drawCompanions(population, PLANETS, 'preview', suns));
  }
  const { sample, spread } = hosts;
  const star = starOfEach(spread);
  const masses = hostMassesOf(sample);
  const drawn = drawCompanions(
    population,
    PLANETS,
    'preview',
    Float64Array.from(star, (j) => masses[j]),
  );
  const size = sample.grid.massMjup.length * sample.grid.semiMajorAxisAu.length;
  const isSeen = Uint8Array.from(star, (j, i) => {
    const own = { ...sample.grid, completeness: sample.maps.subarray(j * size, (j + 1) * size) };
    const seen = interpolateMap(own, drawn.massMjup[i], drawn.semiMajorAxisAu[i]) / 65_535;
    return chances[i] < seen ? 1 : 0;
  });
  return { ...drawn, isSeen };
}

/** The star of each planet: in order, each with its share of them. */
function starOfEach({ star, share }: Spread): number[] {
  let at = 0;
  let upTo = share[0];
  return Array.from({ length: PLANETS }, (_, i) => {
    while (at < star.length - 1 && (i + 0.5) / PLANETS > upTo) upTo += share[++at];
    return star[at];
  });
}

function seeOn(map: MapData | undefined, drawn: Omit<DrawnCompanions, 'isSeen'>): DrawnCompanions {
  const isSeen = Uint8Array.from(drawn.massMjup, (mass, i) =>
    map && chances[i] < interpolateMap(map, mass, drawn.semiMajorAxisAu[i]) ? 1 : 0,
  );
  return { ...drawn, isSeen };
}

/** Share of the population where the mean detection probability is under 5 %, outside included. */
export function shareHardlySeen(
  map: MapData,
  population: Population,
  weights: PopulationWeights,
): number {
  if (population.form === 'systems') {
    let [hardly, whole] = [0, 0];
    population.companionSystem.forEach((system, k) => {
      const own = population.weight[system];
      whole += own;
      const seen = interpolateMap(map, population.massMjup[k], population.semiMajorAxisAu[k]);
      if (seen < HARDLY_SEEN) hardly += own;
    });
    return hardly / whole;
  }
  const columns = map.semiMajorAxisAu.length;
  let share = weights.shareOutsideMap;
  weights.mass.forEach((mass, row) => {
    for (let column = 0; column < columns; column++) {
      if (map.completeness[row * columns + column] < HARDLY_SEEN) {
        share += mass * weights.semiMajorAxis[column];
      }
    }
  });
  return Math.min(1, share);
}

export interface PreviewAnswer {
  view: PopulationView;
  withDetections: Answer | null;
  zero: Answer | null;
}

/** What is asked of a population. */
export interface Asked extends Pick<PreviewSetting, 'prior' | 'credibleLevel'> {
  definition: Population;
}

function askedOf({ prior, credibleLevel }: Asked) {
  return { likelihood: 'host-fraction' as const, prior, level: credibleLevel };
}

export function previewAnswer(sample: LiveSample, asked: Asked): PreviewAnswer | null {
  return orNull(() => {
    const view = viewPopulation(sample.maps, sample.grid, asked.definition, hostMassesOf(sample));
    const answer = (detections: LiveSample['companions']) =>
      orNull(() => answerFromView(view, { ...askedOf(asked), detections }));
    return { view, withDetections: answer(sample.companions), zero: answer([]) };
  });
}

/** Why a population has no answer on a sample. */
export function faultOnSample(sample: LiveSample, population: Population): string | null {
  try {
    const masses = hostMassesOf(sample);
    const names = sample.stars.map(({ name }) => name);
    requireHostMasses(population, masses, names.length, names);
    viewPopulation(sample.maps, sample.grid, population, masses);
    return null;
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return error.message;
  }
}

/** The limit against one number of a law, all others standing still; NaN where there is none. */
export function parameterTrace(
  sample: LiveSample,
  asked: Asked & { definition: LawDefinition },
  parameter: LawParameter,
  values: number[],
): { values: number[]; limits: number[] } {
  const parts = partsOf(asked.definition);
  const masses = hostMassesOf(sample);
  const limits = values.map((value) => {
    const limit = orNull(() => {
      const definition = definitionOf(withParameter(parts, parameter, value));
      const view = viewPopulation(sample.maps, sample.grid, definition, masses);
      return answerFromView(view, { ...askedOf(asked), detections: sample.companions }).limit;
    });
    return limit ?? Number.NaN;
  });
  return { values, limits };
}

const roundStarts = {
  mass: [1, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10, 12, 15, 20, 25, 30, 40],
  ratio: [0.0005, 0.001, 0.0015, 0.002, 0.003, 0.004, 0.005, 0.007, 0.01, 0.015, 0.02, 0.03, 0.05],
};

export interface BetterStart {
  start: number;
  isRatio: boolean;
  definition: LawDefinition;
  share: number;
}

/** The smallest round mass, or mass ratio, from which on hardly anything is out of sight. */
export function betterStart(
  sample: LiveSample,
  meanMap: MapData,
  definition: LawDefinition,
): BetterStart | null {
  const parts = partsOf(definition);
  const [min, max] = parts.mass.range;
  for (const start of roundStarts[parts.isRatio ? 'ratio' : 'mass']) {
    if (start <= min || start >= max) continue;
    const moved = definitionOf({ ...parts, mass: { ...parts.mass, range: [start, max] } });
    const spread = orNull(() => spreadOf(sample, meanMap, moved));
    if (spread === null) continue;
    const share = shareHardlySeen(spread.map, moved, spread.weights);
    if (share < 0.01) return { start, isRatio: parts.isRatio, definition: moved, share };
  }
  return null;
}
