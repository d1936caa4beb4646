import { formatRate, formatSignificant, type RateQuantity } from '@/lib/quantities/display';

/** Whether two limits read the same on screen. */
export function isSameAtTwoDigits(a: number, b: number, quantity: RateQuantity): boolean {
  return formatRate(a, quantity) === formatRate(b, quantity);
}

/** "+0.6 points" for percentages, "+0.6 per 100 stars" for rates. */
export function limitDifference(limit: number, baseline: number, quantity: RateQuantity): string {
  if (isSameAtTwoDigits(limit, baseline, quantity)) return 'no change at 2 digits';
  const sign = limit > baseline ? '+' : '−';
  const size = formatSignificant(100 * Math.abs(limit - baseline), 2);
  return `${sign}${size} ${quantity === 'host_fraction' ? 'points' : 'per 100 stars'}`;
}

/** "1.11 times". */
export function ratioInWords(ratio: number): string {
  return `${ratio.toFixed(2)} times`;
}
