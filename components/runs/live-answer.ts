import {
  type RateCurve,
  rateAxisMax,
  samplePrior,
  sampleRateCurve,
} from '@/components/charts/rate-curve';
import {
  type Answer,
  type AnswerSettings,
  answerFromView,
  equalTailedInterval,
  type Likelihood,
  limitAtLowerFloor,
  limitsByLevel,
  type PopulationView,
  priorFor,
  type RatePosterior,
  TABLE_LEVELS,
} from '@/lib/inference';
import type { RateAnswer, RunResult } from '@/lib/schemas/runs';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';

/** One posterior, summed up at the level of the setting. */
export interface LimitAnswer {
  limit: number;
  median: number;
  interval68: [number, number];
  isConstrained: boolean;
  isSetByPrior: boolean;
  curve: RateCurve;
  /** At the rates of the curve; NaN where the prior has no density. */
  prior: Float64Array;
}

/** Everything that follows a control at once. */
export interface LiveAnswer {
  full: Answer;
  answer: LimitAnswer;
  /** The same sample with every detection set aside. */
  zero: LimitAnswer;
  /** Two more posteriors: made when the table asks for them, and then kept. */
  levels(): RunResult['levels'];
  /** Log-uniform prior: the limit at a tenth of its floor. */
  atTenthOfFloor: number | null;
}

/** The part of a setting that a view of the population does not hold. */
export function askedOf(sample: LiveSample, setting: LiveSetting): AnswerSettings {
  return {
    likelihood: setting.likelihood,
    prior: setting.prior,
    detections: setting.detections === 'none' ? [] : sample.companions,
    level: setting.credibleLevel,
  };
}

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
    full.counted.length === 0 ? full : answerFromView(view, { ...asked, detections: [] });
  const top = rateAxisMax([full.limit, none.limit], full.posterior.support[1]);
  return {
    full,
    answer: sumUp(full, top),
    zero: sumUp(none, top),
    levels: once(() => tableOfLevels(view, asked, full, none)),
    atTenthOfFloor: limitAtLowerFloor(
      {
        likelihood: asked.likelihood,
        prior: asked.prior,
        completeness: view.completenessPerStar ?? Float64Array.of(view.exposure),
        detectedStars: full.counted.map(({ star }) => star),
      },
      asked.level,
    ),
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

/** What a finished run says, in the shape in which a live answer comes. */
export function savedAnswer(answer: RateAnswer): LimitAnswer {
  const { curve } = answer;
  return {
    limit: answer.limit,
    median: answer.median,
    interval68: answer.interval68,
    isConstrained: answer.isConstrained,
    isSetByPrior: answer.isSetByPrior,
    curve: {
      rate: Float64Array.from(curve.value),
      density: Float64Array.from(curve.density),
      cumulative: Float64Array.from(curve.cumulative),
    },
    prior: Float64Array.from(curve.value, (_, point) => curve.prior[point] ?? Number.NaN),
  };
}

const otherLikelihood: Record<Likelihood, Likelihood> = {
  'host-fraction': 'mean-number',
  'mean-number': 'host-fraction',
};

function tableOfLevels(
  view: PopulationView,
  asked: AnswerSettings,
  full: Answer,
  none: Answer,
): RunResult['levels'] {
  const likelihood = otherLikelihood[asked.likelihood];
  const prior = priorFor(asked.prior, likelihood);
  const other = (detections: AnswerSettings['detections']) =>
    prior === null
      ? null
      : orNull(() => answerFromView(view, { ...asked, likelihood, prior, detections }));
  const levels = TABLE_LEVELS.some((level) => Math.abs(level - asked.level) < 1e-9)
    ? [...TABLE_LEVELS]
    : [...TABLE_LEVELS, asked.level].sort((a, b) => a - b);
  const column = (posterior: RatePosterior | undefined) =>
    levels.map((_, row) =>
      posterior === undefined ? null : limitsByLevel(posterior, levels)[row].limit,
    );
  const own = column(full.posterior);
  const ownZero = column(none.posterior);
  const theirs = column(other(asked.detections)?.posterior);
  const theirsZero = column(other([])?.posterior);
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

/** The answer, or null where the question has none. */
export function orNull<T>(ask: () => T): T | null {
  try {
    return ask();
  } catch (reason) {
    if (reason instanceof RangeError) return null;
    throw reason;
  }
}
