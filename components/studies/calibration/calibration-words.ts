import { describeLevel } from '@/lib/inference';
import { formatPlain, formatSignificant, type RateQuantity } from '@/lib/quantities/display';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf } from '@/lib/schemas/study-settings';

export function calibrationInWords(settings: SettingsOf<'calibration'>): string {
  const { surveys, levels, truths, truthPopulationId, seed } = settings;
  return [
    `${surveys} surveys`,
    `levels ${levels.map(describeLevel).join(', ')}`,
    ...(truths
      ? [`truths ${truths.map((rate) => formatPlain(100 * rate)).join(', ')} per 100`]
      : []),
    ...(truthPopulationId ? ['and with another population as the truth'] : []),
    ...(seed ? [`seed ${seed}`] : []),
  ].join(', ');
}

/** Numbers of a list that a person types, in per cent; what is no number stays text for the schema. */
export function readPercentages(text: string): (number | string)[] {
  return text
    .replaceAll('%', ' ')
    .split(/[\s,;]+/)
    .filter((word) => word !== '')
    .map((word) => {
      const value = Number(word);
      // A hundredth of 99.7 has no more digits than 99.7 has.
      return Number.isFinite(value) ? Number((value / 100).toPrecision(12)) : word;
    });
}

export function percentages(fractions: readonly number[] | undefined): string {
  return (fractions ?? []).map((fraction) => formatPlain(100 * fraction, 8)).join(', ');
}

/** "+0.12 ± 0.05 points". */
export function biasInWords(
  { mean, standardError }: ResultOf<'calibration'>['medianBias'],
  quantity: RateQuantity,
): string {
  const size = (value: number) => formatSignificant(100 * Math.abs(value), 2);
  const unit = quantity === 'host_fraction' ? 'points' : 'per 100 stars';
  return `${mean < 0 ? '−' : '+'}${size(mean)} ± ${size(standardError)} ${unit}`;
}
