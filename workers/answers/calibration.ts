import {
  type CalibrationPart,
  type CalibrationSetup,
  calibrationPart,
  coverageAtRates,
  mergeCalibration,
  ratePosterior,
  seenBy,
  viewPopulation,
} from '@/lib/inference';
import { gammaQuantile } from '@/lib/numerics/special';
import type { Population } from '@/lib/population';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf } from '@/lib/schemas/study-settings';
import { type RunQuestion, rateQuestionOf } from './run-question';

export interface CalibrationPlanInput {
  question: RunQuestion;
  settings: SettingsOf<'calibration'>;
  seed: string;
  parts: number;
  /** The truth follows this population; null: the one that the run assumes. */
  truth: { population: Population; hostMassMsun: Float64Array } | null;
}

/** Setups to be worked through: the run's own, and the one whose truth is another. */
export interface CalibrationPlan {
  own: CalibrationSetup;
  other: CalibrationSetup | null;
}

/** Where rates lie at which coverage is told apart: spread over the prior's range. */
const SPREAD = [0.1, 0.3, 0.5, 0.7, 0.9];

function ratesOver(question: RunQuestion): number[] {
  const { prior } = question;
  const { rateQuestion } = rateQuestionOf(question);
  const [low, high] = ratePosterior({ ...rateQuestion, detectedStars: [] }).support;
  if (Number.isFinite(high)) {
    return SPREAD.map((share) =>
      low > 0 ? low * (high / low) ** share : low + share * (high - low),
    );
  }
  if (prior.law !== 'gamma') throw new RangeError('the prior has no end to spread rates over');
  return SPREAD.map((share) => gammaQuantile(share, prior.shape, prior.rate));
}

/** Each star's chance under the truth, over the scale that the analysis assumes for it. */
function chancesUnder(
  question: RunQuestion,
  truth: NonNullable<CalibrationPlanInput['truth']>,
  assumed: Float64Array | undefined,
): Float64Array {
  const { maps, grid, likelihood } = question;
  const view = viewPopulation(maps, grid, truth.population, truth.hostMassMsun);
  const { completeness } = seenBy(view, likelihood);
  return (completeness as Float64Array).map(
    (c, star) => (c * (view.rateScale?.[star] ?? 1)) / (assumed?.[star] ?? 1),
  );
}

export function planCalibration(input: CalibrationPlanInput): CalibrationPlan {
  const { question, settings, seed, parts, truth } = input;
  const { rateQuestion } = rateQuestionOf(question);
  const { likelihood, completeness, rateScale, prior, background } = rateQuestion;
  const own: CalibrationSetup = {
    likelihood,
    completeness,
    ...(rateScale && { rateScale }),
    prior,
    ...(background !== undefined && { background }),
    rates: settings.truths ?? ratesOver(question),
    surveys: settings.surveys,
    parts,
    seed,
  };
  if (truth === null) return { own, other: null };
  const chance = chancesUnder(question, truth, rateScale);
  return { own, other: { ...own, rates: [], truth: { completeness: chance } } };
}

export const calibratePart = ({ setup, part }: { setup: CalibrationSetup; part: number }) =>
  calibrationPart(setup, part);

export interface CalibrationMergeInput {
  plan: CalibrationPlan;
  own: CalibrationPart[];
  other: CalibrationPart[];
  level: number;
  levels: number[];
  /** Name of the population that the truth follows. */
  truthName: string | null;
  hasCandidates: boolean;
}

/** Bounds of the exact coverage that are closer than this are told as one number. */
const KNOWN_WITHIN = 0.01;

/** All parts put together, and what they say of the run's limits. */
export function mergeParts(input: CalibrationMergeInput): ResultOf<'calibration'> {
  const { plan, own, other, level, levels, truthName, hasCandidates } = input;
  const merged = mergeCalibration(plan.own, own, levels);
  const notes: string[] = [];
  if (hasCandidates) {
    notes.push('Invented surveys have confirmed companions alone: open candidates are left aside');
  }
  const atTruth = coverageAtRates(plan.own, own, level);
  if (atTruth.some(({ exact: { low, high } }) => high - low > KNOWN_WITHIN)) {
    notes.push(
      'At a fixed truth theory leaves the coverage open where stars differ in completeness: there ' +
        'only the invented surveys tell it',
    );
  }
  const against = plan.other && mergeCalibration(plan.other, other, levels);
  return {
    kind: 'calibration',
    surveys: merged.surveys,
    seed: plan.own.seed,
    parts: plan.own.parts,
    ranks: merged.ranks,
    coverage: merged.coverage,
    atTruth: atTruth.map(({ rate, exact: { low, high }, observed }) => {
      const exact = high - low > KNOWN_WITHIN ? null : 0.5 * (low + high);
      const chance = exact ?? observed;
      const standardError = Math.sqrt((chance * (1 - chance)) / merged.surveys);
      return { rate, exact, observed, standardError };
    }),
    medianBias: merged.medianBias,
    passes: merged.passes,
    verdict: merged.verdict,
    otherTruth:
      against && truthName !== null
        ? { population: truthName, coverage: against.coverage, verdict: against.verdict }
        : null,
    notes,
  };
}
