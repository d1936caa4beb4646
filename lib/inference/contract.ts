import type { RateQuantity } from '@/lib/quantities/display';
import type { RateNodes } from './integrated-density';

export type { RateQuantity };

/** `mean-number`: Poisson in F; `host-fraction`: one Bernoulli trial per star in f. */
export type Likelihood = 'mean-number' | 'host-fraction';

/**
 * Prior of the rate, normalised on its support.
 *
 * - uniform on [0, max];
 * - log-uniform on [min, max]: the floor `min` > 0 is required, since the limit follows it;
 * - jeffreys: F^(-1/2), cut at `max` when given, or the one of the Bernoulli likelihood for f;
 * - gamma, F only: F^(shape-1) e^(-rate F), rate in stars;
 * - beta, f only: f^(a-1) (1-f)^(b-1);
 * - tabulated: density at increasing values, straight between them and 0 outside, such as an earlier
 *   survey's posterior; `source` says where it is from.
 */
export type RatePrior =
  | { law: 'uniform'; max: number }
  | { law: 'log-uniform'; min: number; max: number }
  | { law: 'jeffreys'; max?: number }
  | { law: 'gamma'; shape: number; rate: number }
  | { law: 'beta'; a: number; b: number }
  | { law: 'tabulated'; value: number[]; density: number[]; source?: string };

/** Most candidates of a host fraction: every subset of them is weighed. */
export const MOST_CANDIDATES = 12;

/** A candidate that nobody settled: its star, and the probability [fraction] that it is real. */
export interface UndecidedCandidate {
  star: number;
  probability: number;
}

/**
 * How candidates without an answer count.
 *
 * - fixed: the posterior is the mean over which of them are real, weighed by their probabilities;
 * - rate-dependent: the probabilities were quoted for a rate, and rise and fall with it.
 */
export type CandidateTreatment =
  | { treatment: 'fixed'; entries: UndecidedCandidate[] }
  | { treatment: 'rate-dependent'; referenceRate: number; entries: UndecidedCandidate[] };

/** What is asked of the data: a likelihood, each star's completeness, the detections and a prior. */
export interface RateQuestion {
  likelihood: Likelihood;
  /** Mean completeness of each star under the population, shape [star], 0..1. */
  completeness: Float64Array;
  /** One index into `completeness` per counted detection; a repeated star counts once for f. */
  detectedStars: number[];
  prior: RatePrior;
  /**
   * s_j: rate of each star over the rate asked for, shape [star], > 0. A fraction of stars then
   * ends where s_j times it reaches 1 for some star; the prior is cut there.
   */
  rateScale?: Float64Array;
  /** b, expected number of false detections among those counted, >= 0: mean number only. */
  background?: number;
  candidates?: CandidateTreatment;
}

/** Posterior of the rate as functions; x is planets per star (F) or a fraction of stars (f). */
export interface RatePosterior {
  quantity: RateQuantity;
  /** S, scalar [stars]: completeness summed over stars. */
  exposure: number;
  /** k: detections that count in the likelihood. */
  detections: number;
  prior: RatePrior;
  /** Support of prior and posterior; the upper end may be Infinity. */
  support: [number, number];
  mean: number;
  median: number;
  standardDeviation: number;
  /** False where the survey could have seen nothing: the posterior is the prior. */
  constrained: boolean;
  /**
   * ln of the integral of prior times rate likelihood (F^k e^(-FS), or f^k times the product of
   * 1 - f C_j): the shape factors of the detections are not in it. NaN for an improper prior, and
   * for candidates of fixed probability, whose weights the likelihood does not set.
   */
  logEvidence: number;
  /** Largest fraction that the rates of single stars allow, where it cuts the prior; else null. */
  cutAt: number | null;
  /** Candidates that are neither confirmed nor refuted; absent: none. */
  undecided?: number;
  /** b, expected false detections; absent: none. */
  background?: number;
  density(x: number): number;
  /** NaN for an improper prior. */
  priorDensity(x: number): number;
  cumulative(x: number): number;
  quantile(p: number): number;
  /** Rule for averages over the posterior, such as predicted counts. */
  nodes(): RateNodes;
}
