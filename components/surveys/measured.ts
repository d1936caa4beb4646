/** Two significant digits, without an exponent: 0.18, 3, 140. */
export function formatErrorPart(error: number): string {
  if (error === 0) return '0';
  const digits = Math.max(0, 1 - Math.floor(Math.log10(Math.abs(error))));
  return error
    .toFixed(Math.min(6, error >= 10 ? 0 : digits))
    .replace(/\.?0+$/, (zeros) => (zeros.startsWith('.') ? '' : zeros));
}

/** A value shown no more finely than its error, or with one decimal below 100. */
export function formatMeasured(value: number, error: number | null): string {
  if (error !== null && error > 0) {
    const digits = error >= 10 ? 0 : Math.max(0, 1 - Math.floor(Math.log10(error)));
    return value.toFixed(Math.min(3, digits));
  }
  return value >= 100 || Number.isInteger(value) ? value.toFixed(0) : value.toFixed(1);
}
