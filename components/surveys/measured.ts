import { errorDecimals } from '@/lib/quantities/display';

/** An error with two figures, without an exponent: 0.18, 3, 140. */
export function formatErrorPart(error: number): string {
  return error === 0 ? '0' : error.toFixed(errorDecimals(Math.abs(error)));
}

/** A value to the decimals of its error, or with one decimal below 100 where there is none. */
export function formatMeasured(value: number, error: number | null): string {
  if (error !== null && error > 0) return value.toFixed(errorDecimals(error));
  return value >= 100 || Number.isInteger(value) ? value.toFixed(0) : value.toFixed(1);
}
