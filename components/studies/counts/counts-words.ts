import { formatPlain, formatRate, type RateQuantity } from '@/lib/quantities/display';
import type { SettingsOf } from '@/lib/schemas/study-settings';

export function countsInWords({ rate }: SettingsOf<'counts'>): string {
  return rate === undefined
    ? 'at the median of the rate'
    : `at a rate of ${formatPlain(100 * rate)} per 100 stars`;
}

/** "at a host fraction of 2.5 %". */
export function rateInWords(rate: number, quantity: RateQuantity): string {
  return quantity === 'host_fraction'
    ? `at a host fraction of ${formatRate(rate, quantity)}`
    : `at ${formatRate(rate, quantity).replace('per', 'planets per')}`;
}
