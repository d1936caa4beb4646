import type { PosteriorData } from '@/components/charts/posterior-words';
import { type RateCurve, rateAxisMax } from '@/components/charts/rate-curve';
import type { RateQuantity } from '@/lib/inference';
import { formatPlain } from '@/lib/quantities/display';
import type { LimitAnswer } from './limit-answer';
import type { LiveSetting } from './live-setting';

interface PosteriorInputs {
  setting: Pick<LiveSetting, 'prior' | 'credibleLevel'>;
  quantity: RateQuantity;
  answer: LimitAnswer;
  zero?: LimitAnswer;
  saved?: { answer: LimitAnswer } & Pick<
    NonNullable<PosteriorData['saved']>,
    'credibleLevel' | 'hasOtherSettings'
  >;
  /** Something was counted: of none only the limit is quoted, and no band is drawn. */
  hasInterval: boolean;
}

/** What the plate draws: the posterior, its prior, and what it is compared with. */
export function posteriorData(inputs: PosteriorInputs): PosteriorData {
  const { setting, quantity, answer, zero, saved, hasInterval } = inputs;
  const largest = quantity === 'host_fraction' ? 1 : Number.POSITIVE_INFINITY;
  const top = rateAxisMax(
    [answer, zero, saved?.answer].flatMap((one) => (one === undefined ? [] : [one.limit])),
    largest,
  );
  const shown = reachTo(answer.curve, top);
  const density = shown.rate.map((rate, point) =>
    rate > priorEnd(setting.prior) ? 0 : answer.prior[Math.min(point, answer.prior.length - 1)],
  );
  return {
    curve: shown,
    limit: answer.limit,
    credibleLevel: setting.credibleLevel,
    quantity,
    median: answer.median,
    interval68: hasInterval ? answer.interval68 : undefined,
    prior: density.some(Number.isFinite)
      ? { density, label: priorLabel(setting.prior, quantity) }
      : undefined,
    alternative:
      zero === undefined
        ? undefined
        : {
            label: 'same run with zero detections',
            curve: reachTo(zero.curve, top),
            limit: zero.limit,
          },
    saved: saved && {
      curve: reachTo(saved.answer.curve, top),
      limit: saved.answer.limit,
      credibleLevel: saved.credibleLevel,
      hasOtherSettings: saved.hasOtherSettings,
    },
  };
}

/** A curve on an axis of its own end: cut there, or carried on where nothing is left of it. */
export function reachTo(curve: RateCurve, top: number): RateCurve {
  let end = curve.rate.findIndex((rate) => rate > top * (1 + 1e-9));
  if (end < 2) end = curve.rate.length;
  const cut = {
    rate: curve.rate.subarray(0, end),
    density: curve.density.subarray(0, end),
    cumulative: curve.cumulative.subarray(0, end),
  };
  if (cut.rate[end - 1] >= 0.98 * top) return cut;
  const append = (values: Float64Array, value: number) => Float64Array.from([...values, value]);
  return {
    rate: append(cut.rate, top),
    density: append(cut.density, 0),
    cumulative: append(cut.cumulative, 1),
  };
}

/** Largest rate that a prior allows. */
function priorEnd(prior: LiveSetting['prior']): number {
  if (prior.law === 'tabulated') return prior.value[prior.value.length - 1];
  return 'max' in prior && prior.max !== undefined ? prior.max : Number.POSITIVE_INFINITY;
}

/** Short enough to stand on the line: "uniform in f from 0 to 1". */
function priorLabel(prior: LiveSetting['prior'], quantity: RateQuantity): string {
  const rate = quantity === 'host_fraction' ? 'f' : 'the mean number';
  switch (prior.law) {
    case 'uniform':
      return `uniform in ${rate} from 0 to ${formatPlain(prior.max)}`;
    case 'log-uniform':
      return `log-uniform from ${formatPlain(prior.min)} to ${formatPlain(prior.max)}`;
    case 'jeffreys':
      return 'Jeffreys';
    case 'gamma':
      return `gamma (${formatPlain(prior.shape)}, ${formatPlain(prior.rate)})`;
    case 'beta':
      return `beta (${formatPlain(prior.a)}, ${formatPlain(prior.b)})`;
    case 'tabulated':
      return prior.source === undefined
        ? 'tabulated'
        : `posterior of ${prior.source.split(',')[0]}`;
  }
}
