import {
  formatInterval,
  formatLimit,
  formatPlain,
  formatRate,
  formatSignificant,
  type RateQuantity,
  rateUnit,
  THIN_SPACE,
} from '@/lib/quantities/display';
import type { ChartTable } from './chart-figure';
import { type DataTable, tableOfColumns } from './data-table';
import { valueAt } from './paths';
import type { RateCurve } from './rate-curve';

export interface OtherPosterior {
  /** Written on the curve: "same run with zero detections". */
  label: string;
  curve: RateCurve;
  limit: number;
}

export interface PosteriorData {
  curve: RateCurve;
  /** Upper limit at `credibleLevel`, in the unit of the curve. */
  limit: number;
  /** Fraction, such as 0.95. */
  credibleLevel: number;
  quantity: RateQuantity;
  median?: number;
  /** Central 68 %. */
  interval68?: [number, number];
  prior?: {
    /** At the points of `curve`, shape [point]. */
    density: Float64Array;
    /** "uniform in f from 0 to 1". */
    label: string;
  };
  /** The same question with zero detections: dashed. */
  alternative?: OtherPosterior;
  /** The stored state while a control is moved: dotted, with the level that its own limit has. */
  saved?: Omit<OtherPosterior, 'label'> & {
    credibleLevel: number;
    /** Ranges, prior or anything else beside the level differ. */
    hasOtherSettings: boolean;
  };
  /** A second analysis on the same axis, with its own limit outlined. */
  second?: OtherPosterior & { name: string };
  /** Name of the first where there are two: "A". */
  name?: string;
  /** What the first curve is, written on it where there are two. */
  label?: string;
}

export function quantityWords(quantity: RateQuantity): string {
  return quantity === 'host_fraction' ? 'host fraction' : 'number of planets per star';
}

/** "95 %". */
export function formatLevel(level: number): string {
  return `${formatPlain(100 * level, 5)}${THIN_SPACE}%`;
}

/** "<5.8 % (95 %)", as it stands on a flag. */
export function limitWithLevel(limit: number, level: number, quantity: RateQuantity): string {
  const words = formatLimit(limit, quantity).replace(' per 100 stars', ' per 100');
  return `${words} (${formatLevel(level)})`;
}

/** "saved <5.8 % (95 %), other settings". */
export function savedWords(saved: NonNullable<PosteriorData['saved']>, quantity: RateQuantity) {
  const words = `saved ${limitWithLevel(saved.limit, saved.credibleLevel, quantity)}`;
  return saved.hasOtherSettings ? `${words}, other settings` : words;
}

/** The chart in one sentence. */
export function posteriorSentence(data: PosteriorData): string {
  const { quantity, credibleLevel } = data;
  const parts = [
    data.median === undefined ? undefined : `median ${formatRate(data.median, quantity)}`,
    data.interval68 && `68 % between ${formatInterval(...data.interval68, quantity)}`,
    `upper limit ${limitWithLevel(data.limit, credibleLevel, quantity)}`,
  ].filter(Boolean);
  const others = [
    data.alternative &&
      `${data.alternative.label}: ${limitWithLevel(data.alternative.limit, credibleLevel, quantity)}`,
    data.second &&
      `${data.second.name}, ${data.second.label}: ${limitWithLevel(data.second.limit, credibleLevel, quantity)}`,
    data.saved && savedWords(data.saved, quantity),
    data.prior && `prior: ${data.prior.label}`,
  ].filter(Boolean);
  const head = `Posterior of the ${quantityWords(quantity)}${data.name ? `, ${data.name}` : ''}`;
  return [`${head}: ${parts.join(', ')}`, ...others].join('. ');
}

const readAt = 20;

/** The summary, then the curve at even steps. */
export function posteriorTables(data: PosteriorData): ChartTable[] {
  const { quantity, credibleLevel, curve } = data;
  const limitRow = (name: string, limit: number, level = credibleLevel) => [
    `${name} (${formatLevel(level)})`,
    formatLimit(limit, quantity),
  ];
  const summary = [
    data.median === undefined ? undefined : ['median', formatRate(data.median, quantity)],
    data.interval68 && ['central 68 %', formatInterval(...data.interval68, quantity)],
    limitRow(data.name ? `upper limit of ${data.name}` : 'upper limit', data.limit),
    data.alternative && limitRow(data.alternative.label, data.alternative.limit),
    data.second && limitRow(`upper limit of ${data.second.name}`, data.second.limit),
    data.saved && limitRow('saved upper limit', data.saved.limit, data.saved.credibleLevel),
    data.prior && ['prior', data.prior.label],
  ].filter((row) => row !== undefined);
  const max = curve.rate[curve.rate.length - 1];
  const rows = Array.from({ length: readAt }, (_, index) => {
    const rate = (max * (index + 1)) / readAt;
    return [
      formatSignificant(100 * rate, 3),
      formatSignificant(valueAt(curve.rate, curve.density, rate), 3),
      formatSignificant(valueAt(curve.rate, curve.cumulative, rate), 3),
    ];
  });
  return [
    { caption: 'Summary of the posterior', columns: ['quantity', 'value'], rows: summary },
    {
      caption: 'Posterior curve; density per unit of the rate',
      columns: [rateUnit(quantity), 'density', 'cumulative probability'],
      rows,
    },
  ];
}

/** A point of the posterior in words, and of the curve beside it where there is one. */
export function sayPosterior(data: PosteriorData, point: number): string[] {
  const { curve, quantity, alternative } = data;
  const rate = curve.rate[point];
  const share = (of: RateCurve, at: number) =>
    `${formatSignificant(100 * valueAt(of.rate, of.cumulative, at), 3)}${THIN_SPACE}%`;
  return [
    formatRate(rate, quantity),
    `${share(curve, rate)} lie below`,
    `density ${formatSignificant(curve.density[point] / (quantity === 'host_fraction' ? 100 : 1), 3)} ${quantity === 'host_fraction' ? `per${THIN_SPACE}%` : 'per planet per star'}`,
    ...(alternative ? [`${share(alternative.curve, rate)} with zero detections`] : []),
  ];
}

/** The curves as columns for files, unrounded. */
export function posteriorColumns(data: PosteriorData): DataTable[] {
  const { curve, quantity, prior, alternative, saved } = data;
  const along = (other: RateCurve) =>
    Float64Array.from(curve.rate, (rate) => valueAt(other.rate, other.density, rate));
  return [
    tableOfColumns('posterior', {
      [quantity]: curve.rate,
      density: curve.density,
      cumulative: curve.cumulative,
      ...(prior && { prior_density: prior.density }),
      ...(alternative && { zero_detections_density: along(alternative.curve) }),
      ...(saved && { saved_density: along(saved.curve) }),
    }),
  ];
}
