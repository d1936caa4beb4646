import { rateAxisMax, samplePrior, sampleRateCurve } from '@/components/charts/rate-curve';
import {
  type Answer,
  type AnswerSettings,
  answerFromView,
  equalTailedInterval,
  type FrequentistCompanions,
  frequentistBeside,
  limitAtLowerFloor,
  limitsByLevel,
  otherLikelihood,
  type PopulationView,
  priorFor,
  type RatePosterior,
  sayMissingColumn,
  TABLE_LEVELS,
  whyNoColumn,
} from '@/lib/inference';
import type { DrawnResult } from '@/lib/schemas/runs';
import type { Beside } from './beside-table';
import type { LimitAnswer } from './limit-answer';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';
import { orNull } from './or-null';

/** Everything that follows a control at once. */
export interface LiveAnswer {
  full: Answer;
  answer: LimitAnswer;
  /** The same sample with every detection set aside. */
  zero: LimitAnswer;
  /** Two more posteriors: made when the table asks for them, and then kept. */
  levels(): DrawnResult['levels'];
  /** Why the table has no column for the other quantity; null: it has one. */
  missingColumn: string | null;
  /** Limits without a prior: made when asked for, and then kept. */
  beside(): Beside;
  /** Log-uniform prior: the limit at a tenth of its floor. */
  atTenthOfFloor: number | null;
}

/** The part of a setting that a view of the population does not hold. */
export function askedOf(sample: LiveSample, setting: LiveSetting): AnswerSettings {
  const isAllSetAside = setting.detections === 'none';
  const { candidates, background } = setting;
  return {
    likelihood: setting.likelihood,
    prior: setting.prior,
    detections: isAllSetAside ? [] : sample.companions,
    candidates: candidates && !isAllSetAside ? { ...candidates, open: sample.open } : null,
    ...(background !== undefined && { background }),
    level: setting.credibleLevel,
  };
}

/** Neither companions nor candidates count. */
const SET_ASIDE = { detections: [], candidates: null } satisfies Partial<AnswerSettings>;

/**
 * Limits, posteriors and the table of levels of a setting.
 *
 * @param view of the setting's population on the sample
 * @throws RangeError where the setting has no answer, with the reason
 */
export function liveAnswer(
  sample: LiveSample,
  view: PopulationView,
  setting: LiveSetting,
): LiveAnswer {
  const asked = askedOf(sample, setting);
  const full = answerFromView(view, asked);
  const none =
    full.counted.length + full.undecided.length === 0
      ? full
      : answerFromView(view, { ...asked, ...SET_ASIDE });
  const top = rateAxisMax([full.limit, none.limit], full.posterior.support[1]);
  return {
    full,
    answer: sumUp(full, top),
    zero: sumUp(none, top),
    levels: once(() => tableOfLevels(view, asked, full, none)),
    missingColumn: sayMissingColumn(full.question),
    beside: once(() =>
      asStored(frequentistBeside(full.question, asked.level, full.posterior), asked.level),
    ),
    atTenthOfFloor: limitAtLowerFloor(full.question, asked.level),
  };
}

function sumUp({ posterior, limit, setByPrior }: Answer, top: number): LimitAnswer {
  const curve = sampleRateCurve(posterior, top);
  return {
    limit,
    median: posterior.median,
    interval68: equalTailedInterval(posterior, 0.68),
    isConstrained: posterior.constrained,
    isSetByPrior: setByPrior,
    curve,
    prior: samplePrior(posterior, curve.rate),
  };
}

/** Limits without a prior in the shape in which a run keeps them. */
function asStored(beside: FrequentistCompanions, level: number): Beside {
  return {
    rows: beside.rows.map(({ name, sides, lower, upper, isApproximate, source }) => ({
      ...{ name, upper, level, isApproximate, source },
      lower: sides === 'one-sided' ? null : lower,
    })),
    sentence: beside.sentence,
  };
}

function tableOfLevels(
  view: PopulationView,
  asked: AnswerSettings,
  full: Answer,
  none: Answer,
): DrawnResult['levels'] {
  const likelihood = otherLikelihood(asked.likelihood);
  const prior = priorFor(asked.prior, likelihood);
  const other = (changes: Partial<AnswerSettings>) =>
    prior === null || whyNoColumn(full.question, likelihood) !== null
      ? null
      : orNull(() => answerFromView(view, { ...asked, ...changes, likelihood, prior }));
  const levels = TABLE_LEVELS.some((level) => Math.abs(level - asked.level) < 1e-9)
    ? [...TABLE_LEVELS]
    : [...TABLE_LEVELS, asked.level].sort((a, b) => a - b);
  const column = (posterior: RatePosterior | undefined) =>
    levels.map((_, row) =>
      posterior === undefined ? null : limitsByLevel(posterior, levels)[row].limit,
    );
  const own = column(full.posterior);
  const ownZero = column(none.posterior);
  const theirs = column(other({})?.posterior);
  const theirsZero = column(other(SET_ASIDE)?.posterior);
  const isFraction = asked.likelihood === 'host-fraction';
  return levels.map((level, row) => ({
    level,
    hostFraction: isFraction ? own[row] : theirs[row],
    meanNumber: isFraction ? theirs[row] : own[row],
    hostFractionZero: isFraction ? ownZero[row] : theirsZero[row],
    meanNumberZero: isFraction ? theirsZero[row] : ownZero[row],
  }));
}

function once<T>(make: () => T): () => T {
  let made: { value: T } | undefined;
  return () => {
    made ??= { value: make() };
    return made.value;
  };
}
