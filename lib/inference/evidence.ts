import { isInside } from '@/lib/population';
import { type PopulationView, seenBy } from './answer';
import type { Likelihood, RatePosterior, RatePrior } from './contract';
import { detectionShape } from './detection-shape';
import type { MeasuredDetection } from './measured-places';
import { ratePosterior } from './posterior';

/** Data and prior that every population of a comparison is weighed with. */
export interface EvidenceSettings {
  likelihood: Likelihood;
  /** Proper, and the same for every population. */
  prior: RatePrior;
  /** All of them must be explained; for the host fraction at most one a star. */
  detections: readonly MeasuredDetection[];
}

/** How well a population foretold the data, whatever its rate. */
export interface PopulationEvidence {
  /** ln Z; -Infinity where the population cannot have made a detection; null where it has no Z. */
  logEvidence: number | null;
  /** Why there is no evidence, or none but zero; else null. */
  fault: string | null;
  /** Sum of ln <pi>_i, each with its star's own rate over the one asked for. */
  logShapes: number;
  /** Of the rate under this population; null where logEvidence is not finite. */
  posterior: RatePosterior | null;
}

const without = (logEvidence: number | null, fault: string): PopulationEvidence => ({
  logEvidence,
  fault,
  logShapes: Number.NEGATIVE_INFINITY,
  posterior: null,
});

function requireOnePerStar({ likelihood, detections }: EvidenceSettings): void {
  if (likelihood === 'mean-number') return;
  const seen = new Set<number>();
  for (const { star, name } of detections) {
    if (seen.has(star)) {
      throw new RangeError(
        `the host fraction counts one detection a star; ${name} is a further one`,
      );
    }
    seen.add(star);
  }
}

/**
 * Evidence of a population: the probability of the data averaged over the prior of the rate.
 *
 * Mean number: the integral of prior(F) exp(-F S) times F <pi>_i for every detection; host fraction:
 * of prior(f) times f <pi>_i and 1 - f C_j for the stars without one.
 *
 * @param view of the population, with each star's map for the host fraction
 * @throws RangeError for a prior that cannot be normalised, whose evidence is arbitrary, for a
 *   second detection of a star (host fraction), and as `ratePosterior` and `measuredPlaces`
 * Edges: a detection outside the population's ranges makes the evidence zero, and the fault says so.
 *   Known up to a factor common to all populations where a measurement is given by samples.
 * Accuracy: 1e-9 of ln Z, the shapes aside.
 */
export function populationEvidence(
  view: PopulationView,
  settings: EvidenceSettings,
): PopulationEvidence {
  requireOnePerStar(settings);
  const { population, hostMassMsun, rateScale } = view;
  const { likelihood, prior, detections } = settings;
  const { completeness, exposure } = seenBy(view, likelihood);
  if (likelihood === 'host-fraction' && completeness === null) {
    throw new RangeError("the host fraction needs each star's map, not only their sum");
  }
  if (population.form === 'systems' && detections.length > 0) {
    return without(null, 'a table of systems has no density where a companion was found');
  }
  let logShapes = 0;
  for (const detection of detections) {
    const { star, name, massMjup, semiMajorAxisAu } = detection;
    const hostMass = hostMassMsun?.[star];
    if (!isInside(population, massMjup, semiMajorAxisAu, hostMass)) {
      return without(
        Number.NEGATIVE_INFINITY,
        `${name} lies outside the ranges of this population`,
      );
    }
    const shape = detectionShape(population, detection, hostMass);
    if (shape === 0) {
      return without(
        Number.NEGATIVE_INFINITY,
        `this population has no companions where ${name} was found`,
      );
    }
    logShapes += Math.log(shape) + (rateScale === null ? 0 : Math.log(rateScale[star]));
  }
  const posterior = ratePosterior({
    likelihood,
    completeness: completeness ?? Float64Array.of(exposure),
    detectedStars: detections.map(({ star }) => star),
    prior,
    ...(rateScale !== null && completeness !== null && { rateScale }),
  });
  if (Number.isNaN(posterior.logEvidence)) {
    throw new RangeError(
      'a prior without an end cannot be normalised: evidences and Bayes factors would be arbitrary; ' +
        'give the prior a maximum',
    );
  }
  const logEvidence = posterior.logEvidence + logShapes;
  return { logEvidence, fault: null, logShapes, posterior };
}

/** Words for a Bayes factor, always shown with their source. */
export interface BayesFactorWords {
  words: string;
  source: string;
}

const SCALE = [
  { below: 2, words: 'not worth more than a bare mention' },
  { below: 6, words: 'positive' },
  { below: 10, words: 'strong' },
  { below: Number.POSITIVE_INFINITY, words: 'very strong' },
];

/**
 * What a Bayes factor is called, by one published scale.
 *
 * @param logBayesFactor ln B; its sign says which of the two is favoured
 * @source Kass & Raftery 1995, J. Am. Stat. Assoc. 90, 773, section 3.2: twice ln B at 2, 6 and 10
 * @example bayesFactorWords(2).words // 'positive'
 */
export function bayesFactorWords(logBayesFactor: number): BayesFactorWords {
  if (Number.isNaN(logBayesFactor)) throw new RangeError('ln B must be a number, got NaN');
  const twice = 2 * Math.abs(logBayesFactor);
  const entry = SCALE.find(({ below }) => twice < below) ?? SCALE[SCALE.length - 1];
  return { words: entry.words, source: 'Kass & Raftery 1995' };
}
