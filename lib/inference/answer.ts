import {
  isInside,
  meanCompleteness,
  meanCompletenessOfStack,
  type Population,
  populationWeights,
} from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';
import type { Likelihood, RatePosterior, RatePrior } from './contract';
import { isSetByPrior, upperLimit } from './intervals';
import { ratePosterior } from './posterior';

/** A companion found: the star that it belongs to and its best mass and semi-major axis. */
export interface Detection {
  /** Index of the star in the stack of maps. */
  star: number;
  massMjup: number;
  semiMajorAxisAu: number;
  name: string;
}

/** Why a detection does not count. */
export type SetAsideReason = 'outside-population' | 'star-already-counted';

export interface DetectionSetAside {
  detection: Detection;
  reason: SetAsideReason;
}

/** All maps of a sample, shape [star, mass, semiMajorAxis]; 16-bit integers hold round(65535 C). */
export type StackedMaps = Uint16Array | Float32Array | Float64Array;

/** Completeness summed over a number of stars, shape [mass, semiMajorAxis] [stars]. */
export interface SummedMap {
  summed: Float64Array;
  stars: number;
}

/** What is asked, apart from the maps and the population. */
export interface AnswerSettings {
  likelihood: Likelihood;
  prior: RatePrior;
  /** Vetted companions to be counted where they lie in the population's ranges. */
  detections: readonly Detection[];
  /** Credible level of the limit [fraction], 0..1. */
  level: number;
}

/** A whole question: maps, shape, likelihood, prior, detections. */
export interface AnswerInputs extends AnswerSettings {
  /** A summed map answers the mean number only. */
  maps: StackedMaps | SummedMap;
  grid: MapGrid;
  population: Population;
}

/** Mean completeness under a population, which prior, detections and level do not change. */
export interface PopulationView {
  population: Population;
  /** Shape [star], 0..1; null where only the summed map was given. */
  completenessPerStar: Float64Array | null;
  /** S [stars]. */
  exposure: number;
  stars: number;
  /** Share of the population outside the maps [fraction]. */
  shareOutsideMap: number;
}

export interface Answer extends PopulationView {
  counted: Detection[];
  setAside: DetectionSetAside[];
  posterior: RatePosterior;
  level: number;
  limit: number;
  setByPrior: boolean;
}

/**
 * Mean completeness of the sample under a population.
 *
 * @returns per star where the maps are stacked, and their sum
 * @throws RangeError for a population that cannot be used or lies outside the maps, and for maps
 *   that do not fit the grid
 * Cost: one multiply-add per node inside the ranges and star.
 */
export function viewPopulation(
  maps: StackedMaps | SummedMap,
  grid: MapGrid,
  population: Population,
): PopulationView {
  const weights = populationWeights(grid, population);
  const { shareOutsideMap } = weights;
  if ('summed' in maps) {
    const exposure = meanCompleteness(maps.summed, weights);
    const { stars } = maps;
    return { population, completenessPerStar: null, exposure, stars, shareOutsideMap };
  }
  const completenessPerStar = meanCompletenessOfStack(maps, weights);
  let exposure = 0;
  for (const c of completenessPerStar) exposure += c;
  const stars = completenessPerStar.length;
  return { population, completenessPerStar, exposure, stars, shareOutsideMap };
}

/**
 * Splits detections into those that count and those that do not, with the reason.
 *
 * Counted are those whose best mass and semi-major axis lie in the box, edges included; for the
 * host fraction the first of each star.
 */
export function countDetections(
  detections: readonly Detection[],
  population: Population,
  likelihood: Likelihood,
): { counted: Detection[]; setAside: DetectionSetAside[] } {
  const counted: Detection[] = [];
  const setAside: DetectionSetAside[] = [];
  const seen = new Set<number>();
  for (const detection of detections) {
    if (!isInside(population, detection.massMjup, detection.semiMajorAxisAu)) {
      setAside.push({ detection, reason: 'outside-population' });
    } else if (likelihood === 'host-fraction' && seen.has(detection.star)) {
      setAside.push({ detection, reason: 'star-already-counted' });
    } else {
      seen.add(detection.star);
      counted.push(detection);
    }
  }
  return { counted, setAside };
}

function checkDetected(counted: Detection[], completeness: Float64Array): void {
  for (const { name, star } of counted) {
    if (!(star in completeness)) {
      throw new RangeError(`${name} belongs to star ${star}, which the sample does not hold`);
    }
    if (completeness[star] === 0) {
      throw new RangeError(
        `${name} was detected where the map of its star says nothing can be seen: check the map, ` +
          'the ranges or the companion',
      );
    }
  }
}

/**
 * Posterior and limit from a view that is already there: prior, detections and level may change.
 *
 * @throws RangeError as `answerQuestion`
 */
export function answerFromView(view: PopulationView, settings: AnswerSettings): Answer {
  const { likelihood, prior, detections, level } = settings;
  const { counted, setAside } = countDetections(detections, view.population, likelihood);
  const { completenessPerStar } = view;
  if (likelihood === 'host-fraction') {
    if (completenessPerStar === null) {
      throw new RangeError("the host fraction needs each star's map, not only their sum");
    }
    checkDetected(counted, completenessPerStar);
  }
  const posterior = ratePosterior({
    likelihood,
    completeness: completenessPerStar ?? Float64Array.of(view.exposure),
    detectedStars: counted.map(({ star }) => star),
    prior,
  });
  return {
    ...view,
    counted,
    setAside,
    posterior,
    level,
    limit: upperLimit(posterior, level),
    setByPrior: isSetByPrior(posterior, level),
  };
}

/**
 * From completeness maps, a population, a prior and detections to the upper limit: the whole chain
 * that a worker runs and that the page repeats live.
 *
 * @param inputs maps (stacked per star, or summed for the mean number), their grid, population,
 *   likelihood, prior, detections, credible level
 * @returns mean completeness per star, exposure, counted and uncounted detections, posterior, limit
 * @throws RangeError for inputs that cannot be used, for a star detected where its map says that
 *   nothing can be seen (host fraction), and for the host fraction of a summed map
 * Edges: `posterior.constrained` false means that the limit is the prior's own.
 */
export function answerQuestion(inputs: AnswerInputs): Answer {
  return answerFromView(viewPopulation(inputs.maps, inputs.grid, inputs.population), inputs);
}
