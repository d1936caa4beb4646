/** Decimals at which a value and its error stand: two digits of the error, hundredths if it has them. */
function decimalsOf(error: number): number {
  if (error >= 10) return 0;
  const decimals = Math.max(0, 1 - Math.floor(Math.log10(error)));
  return error >= 0.01 ? Math.min(2, decimals) : Math.min(5, decimals);
}

/** An error without an exponent: 0.18, 3, 140. */
export function formatErrorPart(error: number): string {
  const size = Math.abs(error);
  if (size === 0) return '0';
  return error
    .toFixed(decimalsOf(size))
    .replace(/\.?0+$/, (zeros) => (zeros.startsWith('.') ? '' : zeros));
}

/** A value shown no more finely than its error, or with one decimal below 100. */
export function formatMeasured(value: number, error: number | null): string {
  if (error !== null && error > 0) {
    const isWhole = Number.isInteger(value) && Number.isInteger(error);
    return value.toFixed(isWhole ? 0 : decimalsOf(error));
  }
  return value >= 100 || Number.isInteger(value) ? value.toFixed(0) : value.toFixed(1);
}
