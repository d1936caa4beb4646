import { formatPercent, formatRate } from '@/lib/quantities/display';
import { checkQuestion } from './checked-question';
import type { RatePosterior, RateQuestion } from './contract';
import { feldmanCousinsInterval } from './feldman-cousins';
import {
  binomialLowerLimit,
  binomialUpperLimit,
  hostFractionLowerLimit,
  hostFractionUpperLimit,
  poissonLowerLimit,
  poissonUpperLimit,
  wilsonInterval,
} from './frequentist';
import { upperLimit } from './intervals';
import { ratePosterior } from './posterior';
import { describeLevel } from './statement';

/** A limit or interval that uses no prior. */
export interface FrequentistRow {
  name: string;
  /** Planets per star, or fraction of stars. */
  lower: number;
  upper: number;
  /** One-sided: each end holds alone at the level; two-sided: both together. */
  sides: 'one-sided' | 'two-sided';
  isApproximate: boolean;
  source: string;
}

export interface FrequentistCompanions {
  /** The exact one for these data first. */
  rows: FrequentistRow[];
  /** How the first differs from the credible limit, in plain words. */
  sentence: string;
}

/** Relative difference below which two limits are called the same. */
const SAME = 0.005;

function numberRows(exposure: number, count: number, background: number, level: number) {
  const rows: FrequentistRow[] = [];
  if (background === 0) {
    rows.push({
      name: 'Garwood',
      lower: poissonLowerLimit(count, exposure, level),
      upper: poissonUpperLimit(count, exposure, level),
      sides: 'one-sided',
      isApproximate: false,
      source: 'Garwood 1936, Biometrika 28, 437',
    });
  }
  const [lower, upper] = feldmanCousinsInterval(count, background, level);
  rows.push({
    name: 'Feldman–Cousins',
    lower: lower / exposure,
    upper: upper / exposure,
    sides: 'two-sided',
    isApproximate: false,
    source: 'Feldman & Cousins 1998, Phys. Rev. D 57, 3873',
  });
  return rows;
}

function fractionRows(completeness: Float64Array, count: number, level: number) {
  const rows: FrequentistRow[] = [
    {
      name: 'exact Poisson-binomial',
      lower: hostFractionLowerLimit(completeness, count, level),
      upper: hostFractionUpperLimit(completeness, count, level),
      sides: 'one-sided',
      isApproximate: false,
      source: 'inversion of the exact distribution of the count',
    },
  ];
  const [first] = completeness;
  if (!(first > 0) || !completeness.every((c) => c === first)) return rows;
  const stars = completeness.length;
  rows.push({
    name: 'Clopper–Pearson',
    lower: Math.min(1, binomialLowerLimit(count, stars, level) / first),
    upper: Math.min(1, binomialUpperLimit(count, stars, level) / first),
    sides: 'one-sided',
    isApproximate: false,
    source: 'Clopper & Pearson 1934, Biometrika 26, 404',
  });
  if (first < 1) return rows;
  const [lower, upper] = wilsonInterval(count, stars, level);
  rows.push({
    name: 'Wilson',
    lower,
    upper,
    sides: 'two-sided',
    isApproximate: true,
    source: 'Wilson 1927, J. Am. Stat. Assoc. 22, 209',
  });
  return rows;
}

function describeDifference(credible: number, confidence: number): string {
  const ratio = credible / confidence - 1;
  if (Math.abs(ratio) < SAME) return 'here the two agree';
  const by = formatPercent(Math.abs(ratio));
  return `here the credible one is ${by} ${ratio < 0 ? 'lower' : 'higher'}`;
}

function tellApart(posterior: RatePosterior, row: FrequentistRow, level: number): string {
  const { quantity } = posterior;
  const credible = upperLimit(posterior, level);
  const at = describeLevel(level);
  return (
    `The credible limit ${formatRate(credible, quantity)} says that, given the prior, the rate lies ` +
    `below it with a probability of ${at}; the confidence limit ${formatRate(row.upper, quantity)} ` +
    `(${row.name}) uses no prior and would cover the true rate, whatever it is, in at least ${at} of ` +
    `repeated surveys; ${describeDifference(credible, row.upper)}.`
  );
}

/**
 * Limits without a prior, to be shown beside the credible ones of the same data.
 *
 * Mean number: Garwood, and Feldman–Cousins, which alone knows a background. Host fraction: the
 * exact Poisson-binomial; Clopper–Pearson where all stars are equally complete, and Wilson's
 * approximation where they are fully so. Undecided candidates are left out.
 *
 * @param level confidence level [fraction], 0 < level < 1
 * @param posterior of the question, where the caller has it
 * @returns rows, and one sentence on how the first differs from the credible limit; no rows where
 *   no star shows anything
 * @throws RangeError as `ratePosterior`, and for a level outside its domain
 */
export function frequentistBeside(
  question: RateQuestion,
  level: number,
  posterior: RatePosterior = ratePosterior(question),
): FrequentistCompanions {
  const { completeness, exposure, counted, background, unit } = checkQuestion(question);
  if (exposure === 0) {
    return { rows: [], sentence: 'Without exposure no rate is excluded, with or without a prior.' };
  }
  const rows =
    question.likelihood === 'mean-number'
      ? numberRows(exposure, counted.length, background, level)
      : fractionRows(completeness, counted.length, level).map((row) => ({
          ...row,
          lower: unit * row.lower,
          upper: unit * row.upper,
        }));
  return { rows, sentence: tellApart(posterior, rows[0], level) };
}
