import type { CalibrationPart } from './calibration';
import { assumedQuestion, type CalibrationSetup } from './calibration';
import { type Coverage, coverageOf, inOrder } from './calibration-verdict';
import { fractionPlacer } from './fraction-fast';
import { poissonBinomial } from './frequentist';
import { rateModel, ratePosterior } from './posterior';
import { countsAtRate } from './prediction';

/** How often a limit holds at a true rate: between two values, which are one where it is exact. */
export interface ExactCoverage {
  low: number;
  high: number;
}

function numberCoverage(setup: CalibrationSetup, rate: number, level: number): ExactCoverage {
  const { background = 0, truth = {}, completeness, rateScale } = setup;
  let exposure = background / Math.max(rate, Number.MIN_VALUE);
  (truth.completeness ?? completeness).forEach((c, j) => {
    exposure += c * (rateScale?.[j] ?? 1);
  });
  const { probability } = countsAtRate(
    { likelihood: 'mean-number', completeness: Float64Array.of(exposure) },
    rate,
  );
  const question = assumedQuestion(setup);
  let covered = 0;
  probability.forEach((p, count) => {
    if (p < 1e-14) return;
    const detectedStars = new Array<number>(count).fill(0);
    if (ratePosterior({ ...question, detectedStars }).cumulative(rate) <= level) covered += p;
  });
  const certain = Math.min(1, covered);
  return { low: certain, high: certain };
}

/**
 * For each number of detections the posteriors of the least and of the most complete stars bound
 * those of all others: a detection of a more complete star moves the posterior up.
 */
function fractionCoverage(setup: CalibrationSetup, rate: number, level: number): ExactCoverage {
  const { truth = {}, completeness, rateScale } = setup;
  const { checked, law } = rateModel(assumedQuestion(setup));
  const chance = (truth.completeness ?? completeness).map((c, j) => c * (rateScale?.[j] ?? 1));
  const seen = Array.from(chance.keys()).filter((j) => chance[j] > 0);
  seen.sort((a, b) => checked.completeness[a] - checked.completeness[b]);
  const counts = poissonBinomial(chance.map((c) => Math.min(1, rate * c)));
  const place = fractionPlacer(checked, law);
  const holds = (stars: number[]) => place(stars, rate / checked.unit).below <= level;
  let [low, high] = [0, 0];
  for (let count = 0; count <= seen.length; count++) {
    if (counts[count] < 1e-14) continue;
    if (holds(seen.slice(0, count))) low += counts[count];
    if (holds(seen.slice(seen.length - count))) high += counts[count];
  }
  // Sums of probabilities may end a rounding above 1.
  return { low: Math.min(low, high, 1), high: Math.min(Math.max(low, high), 1) };
}

/**
 * Coverage of the upper limit at a true rate, summed over what may be found.
 *
 * Mean number: exact. Host fraction: exact where stars are equally complete, else between the two
 * values that the least and the most complete stars with a detection give.
 *
 * @param level credible level [fraction], 0 < level < 1
 * @throws RangeError as `ratePosterior`, and where entries share their outcome
 */
export function exactCoverage(setup: CalibrationSetup, rate: number, level: number): ExactCoverage {
  if (setup.truth?.star !== undefined) {
    throw new RangeError('entries that share their outcome have no coverage by counts');
  }
  return setup.likelihood === 'mean-number'
    ? numberCoverage(setup, rate, level)
    : fractionCoverage(setup, rate, level);
}

/** Coverage at one true rate: simulated, and what it must be. */
export interface CoverageAtRate extends Coverage {
  rate: number;
  exact: ExactCoverage;
}

/**
 * Coverage at each of a setup's rates, simulated and exact.
 *
 * @returns `expected` is the middle of the exact values
 */
export function coverageAtRates(
  setup: CalibrationSetup,
  parts: readonly CalibrationPart[],
  level: number,
): CoverageAtRate[] {
  const sorted = inOrder(setup, parts);
  return setup.rates.map((rate, i) => {
    const exact = exactCoverage(setup, rate, level);
    const below = sorted.flatMap((part) => part.belowAtRate[i]);
    return { rate, exact, ...coverageOf(below, level, 0.5 * (exact.low + exact.high)) };
  });
}
