import {
  hostScalingOf,
  isInside,
  meanCompleteness,
  type Population,
  populationWeights,
  rateScales,
  sampleCompleteness,
} from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';
import type { Likelihood, RatePosterior, RatePrior, RateQuestion } from './contract';
import { isSetByPrior, upperLimit } from './intervals';
import {
  type CountedCandidate,
  candidateTreatment,
  countCandidates,
  type OpenCandidates,
} from './open-candidates';
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
  /** Candidates without an answer; left out or null: set aside. */
  candidates?: OpenCandidates | null;
  /** b, expected number of false detections among those counted; left out: none. */
  background?: number;
  /** Credible level of the limit [fraction], 0..1. */
  level: number;
}

/** A whole question: maps, shape, likelihood, prior, detections. */
export interface AnswerInputs extends AnswerSettings {
  /** A summed map answers the mean number only. */
  maps: StackedMaps | SummedMap;
  grid: MapGrid;
  population: Population;
  /** Shape [star] [M_Sun], NaN where unknown: for populations that depend on the host's mass. */
  hostMassMsun?: Float64Array;
}

/** Mean completeness under a population, which prior, detections and level do not change. */
export interface PopulationView {
  population: Population;
  /**
   * Shape [star], 0..1; null where only the summed map was given. Of tabulated systems the
   * probability that any companion is seen.
   */
  completenessPerStar: Float64Array | null;
  /** Tabulated systems: mean number of companions seen, shape [star], >= 0; else null. */
  numberSeenPerStar: Float64Array | null;
  /** s_j = (M_j/M0)^gamma, shape [star]: each star's rate over the one asked for; else null. */
  rateScale: Float64Array | null;
  /** As given, shape [star] [M_Sun]. */
  hostMassMsun: Float64Array | null;
  /** S, the sum of s_j and completeness [stars]; an answer holds that of its own likelihood. */
  exposure: number;
  stars: number;
  /** Share of the population outside the maps [fraction]. */
  shareOutsideMap: number;
}

export interface Answer extends PopulationView {
  counted: Detection[];
  setAside: DetectionSetAside[];
  /** Candidates without an answer that count with their probability. */
  undecided: CountedCandidate[];
  /** What the posterior answers. */
  question: RateQuestion;
  posterior: RatePosterior;
  level: number;
  limit: number;
  setByPrior: boolean;
}

/** S [stars]: each star's completeness times its rate over the one asked for. */
function sumExposure(perStar: Float64Array, rateScale: Float64Array | null): number {
  let exposure = 0;
  for (let j = 0; j < perStar.length; j++) exposure += (rateScale?.[j] ?? 1) * perStar[j];
  return exposure;
}

function viewSummed(maps: SummedMap, grid: MapGrid, population: Population): PopulationView {
  if (hostScalingOf(population) !== null) {
    throw new RangeError("a rate that scales with the host mass needs each star's own map");
  }
  const weights = populationWeights(grid, population);
  return {
    population,
    completenessPerStar: null,
    numberSeenPerStar: null,
    rateScale: null,
    hostMassMsun: null,
    exposure: meanCompleteness(maps.summed, weights),
    stars: maps.stars,
    shareOutsideMap: weights.shareOutsideMap,
  };
}

/**
 * Mean completeness of the sample under a population.
 *
 * @param hostMassMsun shape [star] [M_Sun], NaN where unknown: for the mass ratio and for a rate
 *   that scales with the host mass
 * @returns per star where the maps are stacked, and their sum
 * @throws RangeError for a population that cannot be used or lies outside the maps, for maps that do
 *   not fit the grid, for a star whose mass is needed and missing, and for a summed map where the
 *   stars differ (mass ratio, host scaling, tabulated systems)
 * Cost: one multiply-add per node inside the ranges and star.
 */
export function viewPopulation(
  maps: StackedMaps | SummedMap,
  grid: MapGrid,
  population: Population,
  hostMassMsun?: Float64Array,
): PopulationView {
  if ('summed' in maps) return viewSummed(maps, grid, population);
  const seen = sampleCompleteness(maps, grid, population, hostMassMsun);
  const stars = seen.perStar.length;
  const rateScale = rateScales(population, hostMassMsun, stars);
  return {
    population,
    completenessPerStar: seen.perStar,
    numberSeenPerStar: seen.numberSeenPerStar,
    rateScale,
    hostMassMsun: hostMassMsun ?? null,
    exposure: sumExposure(seen.perStar, rateScale),
    stars,
    shareOutsideMap: seen.shareOutsideMap,
  };
}

/**
 * A view of stars whose mean completeness is known already.
 *
 * @param population not tabulated systems, and without a rate that scales with the host's mass
 * @param completenessPerStar shape [star], 0..1
 * @param shareOutsideMap share of the population outside the maps [fraction]
 */
export function viewOfStars(
  population: Population,
  completenessPerStar: Float64Array,
  shareOutsideMap = 0,
): PopulationView {
  return {
    population,
    completenessPerStar,
    numberSeenPerStar: null,
    rateScale: null,
    hostMassMsun: null,
    exposure: sumExposure(completenessPerStar, null),
    stars: completenessPerStar.length,
    shareOutsideMap,
  };
}

/**
 * Mean completeness per star and exposure that a likelihood works with.
 *
 * They differ for tabulated systems alone: the mean number counts the companions seen, the host
 * fraction whether any is.
 */
export function seenBy(
  view: PopulationView,
  likelihood: Likelihood,
): { completeness: Float64Array | null; exposure: number } {
  const { completenessPerStar, numberSeenPerStar, rateScale, exposure } = view;
  if (likelihood === 'host-fraction' || numberSeenPerStar === null) {
    return { completeness: completenessPerStar, exposure };
  }
  return { completeness: numberSeenPerStar, exposure: sumExposure(numberSeenPerStar, rateScale) };
}

/**
 * Splits detections into those that count and those that do not, with the reason.
 *
 * Counted are those whose best mass and semi-major axis lie in the box, edges included; for the
 * host fraction the first of each star.
 *
 * @param hostMassMsun shape [star] [M_Sun]: for the mass ratio, whose box differs from star to star
 */
export function countDetections(
  detections: readonly Detection[],
  population: Population,
  likelihood: Likelihood,
  hostMassMsun?: Float64Array | null,
): { counted: Detection[]; setAside: DetectionSetAside[] } {
  const counted: Detection[] = [];
  const setAside: DetectionSetAside[] = [];
  const seen = new Set<number>();
  for (const detection of detections) {
    const { massMjup, semiMajorAxisAu, star } = detection;
    if (!isInside(population, massMjup, semiMajorAxisAu, hostMassMsun?.[star])) {
      setAside.push({ detection, reason: 'outside-population' });
    } else if (likelihood === 'host-fraction' && seen.has(star)) {
      setAside.push({ detection, reason: 'star-already-counted' });
    } else {
      seen.add(star);
      counted.push(detection);
    }
  }
  return { counted, setAside };
}

function checkDetected(
  counted: readonly { name: string; star: number }[],
  completeness: Float64Array,
): void {
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
 * @throws RangeError as `answerQuestion` and `countCandidates`
 */
export function answerFromView(view: PopulationView, settings: AnswerSettings): Answer {
  const { likelihood, prior, detections, level, background } = settings;
  const { population, hostMassMsun, rateScale } = view;
  const { counted, setAside } = countDetections(detections, population, likelihood, hostMassMsun);
  const undecided = countCandidates(settings.candidates?.open ?? [], population, hostMassMsun);
  const { completeness, exposure } = seenBy(view, likelihood);
  if (likelihood === 'host-fraction') {
    if (completeness === null) {
      throw new RangeError("the host fraction needs each star's map, not only their sum");
    }
    checkDetected([...counted, ...undecided], completeness);
  }
  const candidates = candidateTreatment(settings.candidates, undecided);
  const question: RateQuestion = {
    likelihood,
    completeness: completeness ?? Float64Array.of(exposure),
    detectedStars: counted.map(({ star }) => star),
    prior,
    ...(rateScale !== null && { rateScale }),
    ...(background !== undefined && { background }),
    ...(candidates !== undefined && { candidates }),
  };
  const posterior = ratePosterior(question);
  return {
    ...view,
    exposure,
    counted,
    setAside,
    undecided,
    question,
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
  const { maps, grid, population, hostMassMsun } = inputs;
  return answerFromView(viewPopulation(maps, grid, population, hostMassMsun), inputs);
}
