import type { RateQuantity } from '@/lib/quantities/display';

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
 * - beta, f only: f^(a-1) (1-f)^(b-1).
 */
export type RatePrior =
  | { law: 'uniform'; max: number }
  | { law: 'log-uniform'; min: number; max: number }
  | { law: 'jeffreys'; max?: number }
  | { law: 'gamma'; shape: number; rate: number }
  | { law: 'beta'; a: number; b: number };

/** What is asked of the data: a likelihood, each star's completeness, the detections and a prior. */
export interface RateQuestion {
  likelihood: Likelihood;
  /** Mean completeness of each star under the population, shape [star], 0..1. */
  completeness: Float64Array;
  /** One index into `completeness` per counted detection; a repeated star counts once for f. */
  detectedStars: number[];
  prior: RatePrior;
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
   * 1 - f C_j): the shape factors of the detections are not in it. NaN for an improper prior.
   */
  logEvidence: number;
  density(x: number): number;
  /** NaN for an improper prior. */
  priorDensity(x: number): number;
  cumulative(x: number): number;
  quantile(p: number): number;
}
