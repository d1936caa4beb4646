import {
  marginalWeights,
  type Population,
  type PowerLawPopulation,
  populationBox,
  rateScales,
  type ShapedPopulation,
} from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';
import type { Detection, StackedMaps, SummedMap } from './answer';
import type { Likelihood, RatePrior } from './contract';
import { contractStack } from './contraction';
import { isSetByPrior, upperLimit } from './intervals';
import { fractionLimits, type LimitWithoutDetection, numberLimit } from './node-limits';
import { ratePosterior } from './posterior';

/** A population whose density is the product of a law in mass and one in semi-major axis. */
export type SeparablePopulation = PowerLawPopulation | ShapedPopulation;

/** What is asked for many populations at once. */
export interface PairQuestion {
  /** A summed map answers the mean number only, and no rate that scales with the host mass. */
  maps: StackedMaps | SummedMap;
  grid: MapGrid;
  population: Population;
  likelihood: Likelihood;
  prior: RatePrior;
  detections: readonly Detection[];
  /** Credible level [fraction]. */
  level: number;
  /** Shape [star] [M_Sun]: where the rate scales with it. */
  hostMassMsun?: Float64Array;
}

/** Answers for every pair of a choice in mass and one in semi-major axis, shape [mass, axis]. */
export interface PairAnswers {
  /** NaN where a detection lies in the ranges but its star shows nothing of them. */
  limit: Float64Array;
  /** As if nothing had been found. */
  limitWithoutDetections: Float64Array;
  /** S [stars]. */
  exposure: Float64Array;
  /** Detections that count. */
  detections: Int32Array;
  isSetByPrior: Uint8Array;
  /** Share of the population outside the maps [fraction]. */
  shareOutsideMap: Float64Array;
}

const totalOf = (weights: Float64Array) => weights.reduce((sum, one) => sum + one, 0);

/** Stars of the detections inside a pair's ranges; for the host fraction each once. */
function starsFound(
  { detections, likelihood }: PairQuestion,
  inMass: SeparablePopulation,
  inAxis: SeparablePopulation,
): number[] {
  const [mass, axis] = [populationBox(inMass), populationBox(inAxis)];
  const stars = detections
    .filter(({ massMjup: m }) => m >= mass.massMinMjup && m <= mass.massMaxMjup)
    .filter(
      ({ semiMajorAxisAu: a }) => a >= axis.semiMajorAxisMinAu && a <= axis.semiMajorAxisMaxAu,
    )
    .map(({ star }) => star);
  return likelihood === 'host-fraction' ? [...new Set(stars)] : stars;
}

function limitWithDetections(
  { likelihood, prior, level }: PairQuestion,
  completeness: Float64Array,
  detectedStars: number[],
  rateScale: Float64Array | undefined,
): LimitWithoutDetection {
  const isBlind =
    likelihood === 'host-fraction'
      ? detectedStars.some((star) => completeness[star] === 0)
      : completeness.every((c) => c === 0);
  if (isBlind) return { limit: Number.NaN, setByPrior: true };
  const posterior = ratePosterior({
    likelihood,
    completeness,
    detectedStars,
    prior,
    ...(rateScale && { rateScale }),
  });
  return { limit: upperLimit(posterior, level), setByPrior: isSetByPrior(posterior, level) };
}

/**
 * Limits for every pair of a law in mass and a law in semi-major axis, in one pass over the maps.
 *
 * Only the weights differ between the pairs, so that each map is read once and contracted with all.
 *
 * @param massChoices populations whose laws and ranges in mass are taken
 * @param axisChoices populations whose laws and ranges in semi-major axis are taken
 * @returns shape [mass choice, axis choice] each
 * @throws RangeError for a population, prior or level that cannot be used, for maps that do not fit
 *   the grid, for the host fraction or a scaled rate of a summed map, and for missing host masses
 * Edges: a pair outside the maps has exposure 0 and the prior's own limit.
 * Cost: `contractStack`, and a limit a pair: 64 multiply-adds a star (host fraction, uniform prior).
 */
export function answerPairs(
  question: PairQuestion,
  massChoices: readonly SeparablePopulation[],
  axisChoices: readonly SeparablePopulation[],
): PairAnswers {
  const { maps, grid, population, likelihood, prior, level, hostMassMsun } = question;
  const isSummed = 'summed' in maps;
  if (isSummed && likelihood === 'host-fraction') {
    throw new RangeError("the host fraction needs each star's map, not only their sum");
  }
  const massWeights = massChoices.map((one) => marginalWeights(grid, one).mass);
  const axisWeights = axisChoices.map((one) => marginalWeights(grid, one).semiMajorAxis);
  const means = contractStack(isSummed ? maps.summed : maps, grid, massWeights, axisWeights);
  const pairs = massChoices.length * axisChoices.length;
  const stars = means.length / pairs;
  if (isSummed && stars !== 1) throw new RangeError('the summed map does not fit the grid');
  const rateScale =
    rateScales(population, hostMassMsun, isSummed ? maps.stars : stars) ?? undefined;
  if (isSummed && rateScale !== undefined) {
    throw new RangeError("a rate that scales with the host mass needs each star's own map");
  }
  if (!isSummed)
    for (let i = 0; i < means.length; i++) means[i] = Math.min(1, Math.max(0, means[i]));
  const exposure = new Float64Array(pairs).map((_, pair) => {
    let sum = 0;
    for (let star = 0; star < stars; star++) {
      sum += (rateScale?.[star] ?? 1) * means[pair * stars + star];
    }
    return sum;
  });
  const none =
    likelihood === 'mean-number'
      ? Array.from(exposure, numberLimit(prior, level))
      : fractionLimits(means, stars, prior, level, rateScale);
  const answers: PairAnswers = {
    limit: Float64Array.from(none, ({ limit }) => limit),
    limitWithoutDetections: Float64Array.from(none, ({ limit }) => limit),
    exposure,
    detections: new Int32Array(pairs),
    isSetByPrior: Uint8Array.from(none, ({ setByPrior }) => Number(setByPrior)),
    shareOutsideMap: new Float64Array(pairs),
  };
  for (let pair = 0; pair < pairs; pair++) {
    const i = Math.floor(pair / axisChoices.length);
    const j = pair % axisChoices.length;
    const inside = totalOf(massWeights[i]) * totalOf(axisWeights[j]);
    answers.shareOutsideMap[pair] = Math.max(0, 1 - inside);
    const found = starsFound(question, massChoices[i], axisChoices[j]);
    if (found.length === 0) continue;
    const own = means.subarray(pair * stars, (pair + 1) * stars);
    const { limit, setByPrior } = limitWithDetections(question, own, found, rateScale);
    answers.detections[pair] = found.length;
    answers.limit[pair] = limit;
    answers.isSetByPrior[pair] = Number(setByPrior);
  }
  return answers;
}

/** The population where it is a product of two laws that all stars share. */
export function requireSeparable(population: Population, what: string): SeparablePopulation {
  if (population.form === 'power-law' || population.form === 'shaped') return population;
  throw new RangeError(
    population.form === 'systems'
      ? `${what} needs laws along the axes, which a table of systems does not have`
      : `${what} needs ranges in mass that all stars share, which a mass ratio does not have`,
  );
}
