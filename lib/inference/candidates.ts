import { logSumExp } from '@/lib/numerics/sums';
import { backgroundLikelihood } from './background';
import type { CheckedQuestion } from './checked-question';
import { MOST_CANDIDATES } from './contract';
import { poissonBinomial } from './frequentist';
import { hostFractionLikelihood } from './host-fraction';
import { integrateDensity } from './integrated-density';
import { poissonLikelihood, type RateLikelihood } from './poisson';
import type { PriorLaw } from './prior-law';
import { stretchesOf } from './product';

/** The likelihood of a number of detections, candidates aside. */
export function settledLikelihood(question: CheckedQuestion, counted: number[]): RateLikelihood {
  const { likelihood, completeness, exposure, background } = question;
  if (likelihood === 'host-fraction') return hostFractionLikelihood(completeness, counted);
  return background > 0
    ? backgroundLikelihood(exposure, counted.length, background)
    : poissonLikelihood(exposure, counted.length);
}

/** The same for stars of the fraction without the candidates' own. */
function withoutCandidates(question: CheckedQuestion): RateLikelihood {
  const completeness = question.completeness.slice();
  for (const { star } of question.undecided) completeness[star] = 0;
  return hostFractionLikelihood(completeness, question.counted);
}

/**
 * Candidates whose probability was quoted for a rate: each multiplies the likelihood.
 *
 * Mean number: (1 - r) + r F/F0, with a background b (1 - r) + r (F S + b)/(F0 S + b). Host fraction:
 * (1 - r)(1 - f C)/(1 - f0 C) + r f/f0 in place of the star's own 1 - f C. So r = 0 and r = 1 are
 * without and with a detection.
 *
 * @param question with at least one undecided candidate
 */
export function rateDependentLikelihood(question: CheckedQuestion): RateLikelihood {
  return question.likelihood === 'host-fraction'
    ? rateDependentFraction(question)
    : rateDependentNumber(question);
}

function rateDependentNumber(question: CheckedQuestion): RateLikelihood {
  const { counted, undecided, exposure, background, referenceRate } = question;
  const base = settledLikelihood(question, counted);
  const expected = referenceRate * exposure + background;
  return {
    ...base,
    growth: (base.growth ?? 0) + undecided.length,
    logRegular(x, complement) {
      // Without exposure every factor is 1: what was found is background.
      const ratio = expected > 0 ? (x * exposure + background) / expected : 1;
      let sum = base.logRegular(x, complement);
      for (const { probability: r } of undecided) sum += Math.log(1 - r + r * ratio);
      return sum;
    },
  };
}

function rateDependentFraction(question: CheckedQuestion): RateLikelihood {
  const { completeness, undecided, referenceRate: x0 } = question;
  const base = withoutCandidates(question);
  const factors = undecided.map(({ star, probability: r }) => {
    const c = completeness[star];
    return { c, none: (1 - r) / (1 - x0 * c), real: r / x0 };
  });
  return {
    ...base,
    logRegular(x, complement) {
      let sum = base.logRegular(x, complement);
      for (const { c, none, real } of factors) {
        sum += Math.log(none * (1 - c + c * complement) + real * x);
      }
      return sum;
    },
  };
}

const logMassOf = (law: PriorLaw, likelihood: RateLikelihood) =>
  integrateDensity(stretchesOf(law, likelihood)).logMass;

function mixtureOfCounts(question: CheckedQuestion, law: PriorLaw): RateLikelihood {
  const { counted, undecided } = question;
  const parts = Array.from({ length: undecided.length + 1 }, (_, n) =>
    settledLikelihood(question, [...counted, ...new Array<number>(n).fill(0)]),
  );
  const weights = poissonBinomial(undecided.map(({ probability }) => probability));
  const logWeight = parts.map((part, n) => Math.log(weights[n]) - logMassOf(law, part));
  const logs = new Float64Array(parts.length);
  const lowest = parts[0].powerOfRate;
  return {
    ...parts[0],
    growth: (parts[0].growth ?? 0) + undecided.length,
    logRegular(x, complement) {
      const logX = Math.log(x);
      parts.forEach((part, n) => {
        const power = part.powerOfRate - lowest;
        const rate = power === 0 ? 0 : power * logX;
        logs[n] = logWeight[n] + rate + part.logRegular(x, complement);
      });
      return logSumExp(logs);
    },
  };
}

/** Probability and ln evidence of every subset: bit i of the index says that candidate i is real. */
function weighSubsets(question: CheckedQuestion, law: PriorLaw, base: RateLikelihood) {
  const { undecided, completeness } = question;
  const count = undecided.length;
  const bySize = Array.from({ length: count + 1 }, (_, size) => {
    const part = { ...base, powerOfRate: base.powerOfRate + size };
    const { logMass, nodes } = integrateDensity(stretchesOf(law, part));
    const { rate, weight } = nodes();
    const kept = Int32Array.from(rate.keys()).filter((i) => weight[i] > 1e-18);
    const unseen = undecided.map(({ star }) =>
      Float64Array.from(kept, (i) => 1 - completeness[star] * rate[i]),
    );
    return { logMass, weight: Float64Array.from(kept, (i) => weight[i]), unseen };
  });
  return Float64Array.from({ length: 2 ** count }, (_, subset) => {
    let size = 0;
    let probability = 1;
    for (let i = 0; i < count; i++) {
      const isReal = (subset >> i) & 1;
      size += isReal;
      probability *= isReal ? undecided[i].probability : 1 - undecided[i].probability;
    }
    const { logMass, weight, unseen } = bySize[size];
    const product = weight.slice();
    for (let i = 0; i < count; i++) {
      if ((subset >> i) & 1) continue;
      for (let at = 0; at < product.length; at++) product[at] *= unseen[i][at];
    }
    let mass = 0;
    for (const one of product) mass += one;
    return Math.log(probability) - logMass - Math.log(mass);
  });
}

function mixtureOfSubsets(question: CheckedQuestion, law: PriorLaw): RateLikelihood {
  const { undecided, completeness } = question;
  if (undecided.length > MOST_CANDIDATES) {
    throw new RangeError(
      `at most ${MOST_CANDIDATES} undecided candidates can be weighed for a fraction of stars, got ` +
        `${undecided.length}: settle some, or ask for the mean number`,
    );
  }
  const base = withoutCandidates(question);
  const logWeights = weighSubsets(question, law, base);
  const largest = logWeights.reduce((a, b) => Math.max(a, b));
  const weights = logWeights.map((value) => Math.exp(value - largest));
  const products = new Float64Array(weights.length);
  return {
    ...base,
    logRegular(x, complement) {
      products[0] = 1;
      undecided.forEach(({ star }, i) => {
        const c = completeness[star];
        const unseen = 1 - c + c * complement;
        const half = 1 << i;
        for (let subset = 0; subset < half; subset++) {
          products[half + subset] = products[subset] * x;
          products[subset] *= unseen;
        }
      });
      let sum = 0;
      for (let subset = 0; subset < weights.length; subset++) {
        sum += weights[subset] * products[subset];
      }
      return base.logRegular(x, complement) + largest + Math.log(sum);
    },
  };
}

/**
 * Candidates of fixed probability: the mean of the posteriors for every way they may turn out.
 *
 * Mean number: only how many are real matters, with the exact distribution of that number. Host
 * fraction: every subset. What is returned takes the place of a likelihood; each part is divided by
 * its own evidence under the prior, so that the weights stay as they were given.
 *
 * @param question with at least one undecided candidate
 * @throws RangeError for more than 12 candidates of a host fraction
 * Accuracy: 1e-10 of the probability. Cost: 13 integrals at most, then up to 8192 products a place.
 */
export function fixedMixture(question: CheckedQuestion, law: PriorLaw): RateLikelihood {
  return question.likelihood === 'mean-number'
    ? mixtureOfCounts(question, law)
    : mixtureOfSubsets(question, law);
}
