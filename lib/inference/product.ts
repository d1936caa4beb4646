import { integrateDensity, type Stretch } from './integrated-density';
import type { RateLikelihood } from './poisson';
import type { PriorLaw } from './prior-law';
import { fromOne, fromZero, type LogDensity, linear, logarithmic } from './stretches';

/** What says nothing of the rate. */
export const NO_DATA: RateLikelihood = {
  powerOfRate: 0,
  powerOfComplement: 0,
  logRegular: () => 0,
  decay: 0,
};

/** Prior times likelihood: the two powers put together, and the rest. */
export interface Product {
  exponentAtZero: number;
  exponentAtOne: number;
  logDensity: LogDensity;
}

/** Puts the powers of prior and likelihood together. */
export function multiply(prior: PriorLaw, likelihood: RateLikelihood): Product {
  const exponentAtZero = prior.exponentAtZero + likelihood.powerOfRate;
  const exponentAtOne = prior.exponentAtOne + likelihood.powerOfComplement;
  return {
    exponentAtZero,
    exponentAtOne,
    logDensity: (place) => {
      const { x, complement } = place;
      return (
        (exponentAtZero === 1 ? 0 : (exponentAtZero - 1) * place.logX) +
        (exponentAtOne === 1 ? 0 : (exponentAtOne - 1) * place.logComplement) +
        prior.logRegular(x, complement) +
        likelihood.logRegular(x, complement)
      );
    },
  };
}

/** Upper end for an unbounded prior: the posterior's weight above it is below 1e-20. */
function effectiveEnd(exponent: number, decay: number): number {
  if (!(decay > 0)) {
    throw new RangeError(
      'there is no posterior: the stars show nothing of this population and the prior has no ' +
        'upper end; give the prior a maximum',
    );
  }
  return (exponent + 10 * Math.sqrt(exponent) + 60) / decay;
}

/** The pieces of the support in which prior times likelihood is smooth. */
export function stretchesOf(prior: PriorLaw, likelihood: RateLikelihood): Stretch[] {
  const [low, top] = prior.support;
  const { exponentAtZero, exponentAtOne, logDensity } = multiply(prior, likelihood);
  if (prior.breaks !== undefined) {
    const { breaks } = prior;
    return breaks.slice(1).map((to, i) => linear(breaks[i], to, logDensity));
  }
  if (low > 0) return [logarithmic(low, top, logDensity)];
  if (top === Number.POSITIVE_INFINITY) {
    const growth = exponentAtZero + (likelihood.growth ?? 0);
    const end = effectiveEnd(growth, prior.decay + likelihood.decay);
    return [fromZero(end, exponentAtZero, logDensity)];
  }
  if (top !== 1) return [fromZero(top, exponentAtZero, logDensity)];
  return [fromZero(0.5, exponentAtZero, logDensity), fromOne(0.5, exponentAtOne, logDensity)];
}

/** ln of the integral of a prior; NaN where it has none. */
export function logPriorNorm(prior: PriorLaw): number {
  if (prior.logNorm === null) return Number.NaN;
  if (prior.logNorm !== 'numerical') return prior.logNorm;
  return integrateDensity(stretchesOf(prior, NO_DATA)).logMass;
}
