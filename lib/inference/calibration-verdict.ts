import { gammaQ } from '@/lib/numerics/special';
import { formatPercent } from '@/lib/quantities/display';
import { type CalibrationPart, type CalibrationSetup, RANK_DRAWS } from './calibration';
import { describeLevel } from './statement';

/** How often a limit held. */
export interface Coverage {
  level: number;
  observed: number;
  /** What theory predicts. */
  expected: number;
  standardError: number;
}

export interface Calibration {
  surveys: number;
  ranks: {
    draws: number;
    /** Truths by rank, 20 bins of 5 ranks. */
    bins: number[];
    chiSquare: number;
    pValue: number;
    /** Largest distance of the ranks' distribution from the even one, and its 99.9 % band. */
    ecdfDistance: number;
    ecdfBand: number;
    /** Of the posterior probabilities below the truth (Kolmogorov-Smirnov). */
    kolmogorovP: number;
  };
  /** Truth drawn from the prior: theory predicts the level itself. */
  coverage: Coverage[];
  medianBias: { mean: number; standardError: number };
  passes: boolean;
  verdict: string;
}

const BINS = 20;
/** Smallest probability of a test that passes. */
const LEAST_P = 0.001;
/** Standard errors that a coverage may lie from its prediction. */
const ERRORS = 4;

/** Share of surveys whose limit at a level lies above the truth. */
export function observedCoverage(below: readonly number[], level: number): number {
  return below.filter((p) => p <= level).length / below.length;
}

export function coverageOf(below: readonly number[], level: number, expected: number): Coverage {
  return {
    level,
    observed: observedCoverage(below, level),
    expected,
    standardError: Math.sqrt((expected * (1 - expected)) / below.length),
  };
}

/** Whether an observed coverage lies within four standard errors of the predicted one. */
export function isAsPredicted({ observed, expected, standardError }: Coverage): boolean {
  return Math.abs(observed - expected) <= ERRORS * standardError + 1e-12;
}

/** Largest distance of values from the even distribution on 0 to 1. */
function distanceFromEven(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const n = sorted.length;
  return sorted.reduce(
    (worst, value, i) => Math.max(worst, Math.abs(value - i / n), Math.abs((i + 1) / n - value)),
    0,
  );
}

/**
 * Probability of a Kolmogorov-Smirnov distance at least as large by chance.
 *
 * @source Stephens 1970, J. R. Stat. Soc. B 32, 115 (correction for finite n; from memory)
 */
export function kolmogorovP(distance: number, n: number): number {
  const root = Math.sqrt(n);
  const lambda = (root + 0.12 + 0.11 / root) * distance;
  if (lambda < 0.2) return 1;
  let sum = 0;
  for (let j = 1; j <= 100; j++) sum += (j % 2 === 1 ? 2 : -2) * Math.exp(-2 * (j * lambda) ** 2);
  return Math.min(1, Math.max(0, sum));
}

function rankTests(ranks: readonly number[]) {
  const counts = new Array<number>(RANK_DRAWS + 1).fill(0);
  for (const rank of ranks) counts[rank]++;
  const perBin = (RANK_DRAWS + 1) / BINS;
  const bins = Array.from({ length: BINS }, (_, bin) =>
    counts.slice(bin * perBin, (bin + 1) * perBin).reduce((a, b) => a + b, 0),
  );
  const expected = ranks.length / BINS;
  const chiSquare = bins.reduce((sum, n) => sum + (n - expected) ** 2 / expected, 0);
  let below = 0;
  let ecdfDistance = 0;
  counts.forEach((n, rank) => {
    below += n / ranks.length;
    ecdfDistance = Math.max(ecdfDistance, Math.abs(below - (rank + 1) / (RANK_DRAWS + 1)));
  });
  return {
    draws: RANK_DRAWS,
    bins,
    chiSquare,
    pValue: gammaQ(0.5 * (BINS - 1), 0.5 * chiSquare),
    ecdfDistance,
    // Dvoretzky-Kiefer-Wolfowitz with Massart's constant: holds for every n and for steps too.
    ecdfBand: Math.sqrt(Math.log(2 / LEAST_P) / (2 * ranks.length)),
  };
}

function inWords(passes: boolean, coverage: readonly Coverage[], surveys: number): string {
  const worst = coverage.reduce((a, b) =>
    Math.abs(b.observed - b.expected) / b.standardError >
    Math.abs(a.observed - a.expected) / a.standardError
      ? b
      : a,
  );
  const level = `the ${describeLevel(worst.level)} limit`;
  const named =
    coverage.length === 1 ? level : `furthest off of the ${coverage.length} levels asked, ${level}`;
  const held =
    `${named} held in ${formatPercent(worst.observed, 3)} of ` +
    `${surveys} invented surveys, where ${formatPercent(worst.expected, 3)} is expected`;
  return passes
    ? `Limits hold as often as they say: ${held}, and the truths spread evenly over their posteriors`
    : `Limits do not hold as often as they say: ${held}; or the truths do not spread evenly over ` +
        'their posteriors';
}

/**
 * Puts the parts of a calibration study together and judges it.
 *
 * Passes when the ranks are even (chi-square over 20 bins, distribution inside its 99.9 % band),
 * the probabilities below the truth are (Kolmogorov-Smirnov), each at p >= 0.001, and every coverage
 * lies within four standard errors of its level.
 *
 * @param parts all parts of the setup, in any order
 * @param levels of the limits whose coverage is told [fraction]
 * @throws RangeError where a part is missing or there twice
 */
export function mergeCalibration(
  setup: CalibrationSetup,
  parts: readonly CalibrationPart[],
  levels: readonly number[],
): Calibration {
  const sorted = inOrder(setup, parts);
  const below = sorted.flatMap((part) => part.below);
  const offsets = sorted.flatMap((part) => part.medianOffset);
  const tests = rankTests(sorted.flatMap((part) => part.ranks));
  const n = below.length;
  const ranks = { ...tests, kolmogorovP: kolmogorovP(distanceFromEven(below), n) };
  const coverage = levels.map((level) => coverageOf(below, level, level));
  const mean = offsets.reduce((a, b) => a + b, 0) / n;
  const variance = offsets.reduce((sum, x) => sum + (x - mean) ** 2, 0) / Math.max(1, n - 1);
  const passes =
    ranks.pValue >= LEAST_P &&
    ranks.ecdfDistance <= ranks.ecdfBand &&
    ranks.kolmogorovP >= LEAST_P &&
    coverage.every(isAsPredicted);
  return {
    surveys: n,
    ranks,
    coverage,
    medianBias: { mean, standardError: Math.sqrt(variance / n) },
    passes,
    verdict: inWords(passes, coverage, n),
  };
}

/** Parts in the order of their numbers, each there once. */
export function inOrder(setup: CalibrationSetup, parts: readonly CalibrationPart[]) {
  const sorted = [...parts].sort((a, b) => a.part - b.part);
  if (sorted.length !== setup.parts || sorted.some(({ part }, i) => part !== i)) {
    throw new RangeError(
      `parts 0 to ${setup.parts - 1}, each once, got ${sorted.map(({ part }) => part).join(', ')}`,
    );
  }
  return sorted;
}
