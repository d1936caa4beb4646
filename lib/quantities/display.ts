/** U+2009: between a number and its unit. */
export const THIN_SPACE = '\u2009';
/** U+2013: between the ends of a range. */
const EN_DASH = '\u2013';
/** U+2212: numbers on screen carry a true minus sign. */
const MINUS = '\u2212';

/** What a rate counts: planets per star may exceed 1, the share of stars with a planet may not. */
export type RateQuantity = 'companions_per_star' | 'host_fraction';

/** How an index is quoted: dN/dM (linear) or dN/d ln M (log). */
export type QuotedConvention = 'linear' | 'log';

/** Largest and smallest sizes written without a power of ten. */
const PLAIN_MAX = 1e6;
const PLAIN_MIN = 1e-4;

/**
 * A number rounded to nearest at a number of significant digits, trailing zeros kept.
 *
 * @param value finite number
 * @param digits significant digits, integer 1 to 17
 * @throws RangeError for a value that is not finite or digits outside 1 to 17
 * @example formatSignificant(0.05764, 2) // '0.058'
 */
export function formatSignificant(value: number, digits: number): string {
  if (!Number.isFinite(value)) throw new RangeError(`value must be finite, got ${value}`);
  if (!Number.isInteger(digits) || digits < 1 || digits > 17) {
    throw new RangeError(`digits must be an integer between 1 and 17, got ${digits}`);
  }
  if (value === 0) return '0';
  const rounded = Number(value.toPrecision(digits));
  const size = Math.abs(rounded);
  if (size >= PLAIN_MAX || size < PLAIN_MIN) {
    const [mantissa, power] = rounded.toExponential(digits - 1).split('e');
    return withMinus(`${mantissa}e${Number(power)}`);
  }
  const decimals = Math.max(0, digits - 1 - Math.floor(Math.log10(size) + 1e-12));
  return withMinus(rounded.toFixed(decimals));
}

/**
 * A fraction as a percentage: 0.0576 gives '5.8 %' with a thin space.
 *
 * @param fraction [fraction], finite
 * @param digits significant digits, default 2
 */
export function formatPercent(fraction: number, digits = 2): string {
  return `${formatSignificant(100 * fraction, digits)}${THIN_SPACE}%`;
}

/**
 * A mean number of companions per star, as planets per 100 stars: 0.0576 gives '5.8 per 100 stars'.
 *
 * @param companionsPerStar [companions per star], finite
 * @param digits significant digits, default 2
 */
export function formatPer100(companionsPerStar: number, digits = 2): string {
  return `${formatSignificant(100 * companionsPerStar, digits)} per 100 stars`;
}

/**
 * An upper limit with two significant digits, rounded to nearest.
 *
 * @param value the limit [fraction of stars, or companions per star]
 * @param quantity what it limits
 * @returns '<5.8 %' for a host fraction, '<5.8 per 100 stars' for a mean number
 * @example formatLimit(0.0576, 'host_fraction') // '<5.8 %' with a thin space
 */
export function formatLimit(value: number, quantity: RateQuantity): string {
  return `<${formatRate(value, quantity)}`;
}

/** The unit in which a rate is shown, for heads of columns and axes. */
export function rateUnit(quantity: RateQuantity): string {
  return quantity === 'host_fraction' ? '% of stars' : 'planets per 100 stars';
}

/**
 * A rate in the unit of its quantity, without the sign of a limit.
 *
 * @param value [fraction of stars, or companions per star]
 * @param digits significant digits, default 2
 */
export function formatRate(value: number, quantity: RateQuantity, digits = 2): string {
  return quantity === 'host_fraction' ? formatPercent(value, digits) : formatPer100(value, digits);
}

/** A place on the sky [deg], to 0.04 arcseconds: "−52.64735°". */
export function formatPlace(raDeg: number, decDeg: number): string {
  return [raDeg, decDeg].map((angle) => `${angle.toFixed(5).replace('-', '\u2212')}°`).join(' ');
}

/**
 * The shortest form of a number that a person would type: up to `digits` digits, no trailing zeros.
 *
 * @param value finite number
 * @param digits most significant digits, default 4
 * @example formatPlain(10) // '10'
 */
export function formatPlain(value: number, digits = 4): string {
  const text = formatSignificant(value, digits);
  if (!text.includes('.')) return text;
  const [mantissa, power] = text.split('e');
  const trimmed = mantissa.replace(/\.?0+$/, '');
  return power === undefined ? trimmed : `${trimmed}e${power}`;
}

/**
 * A range with its unit: '5–13 Mjup'.
 *
 * @param min lower end
 * @param max upper end
 * @param unit written after a thin space; '' for none
 */
export function formatRange(min: number, max: number, unit: string): string {
  const suffix = unit === '' ? '' : `${THIN_SPACE}${unit}`;
  return `${formatPlain(min)}${EN_DASH}${formatPlain(max)}${suffix}`;
}

/**
 * An interval of rates in one unit: '1.3–4.3 %'.
 *
 * @param low lower end [fraction of stars, or companions per star]
 * @param high upper end
 */
export function formatInterval(low: number, high: number, quantity: RateQuantity): string {
  const ends = [low, high].map((x) => formatSignificant(100 * x, 2)).join(EN_DASH);
  return quantity === 'host_fraction' ? `${ends}${THIN_SPACE}%` : `${ends} per 100 stars`;
}

/**
 * A value with its errors, two digits of the smaller error: '24 ± 3 Myr', '3.1 +2.2 −1.4 Mjup'.
 *
 * @param value central value
 * @param lower size of the downward error, >= 0
 * @param upper size of the upward error, >= 0
 * @param unit written after a thin space; '' for none
 * @throws RangeError for a negative error
 */
export function formatAsymmetric(value: number, lower: number, upper: number, unit = ''): string {
  if (!(lower >= 0)) throw new RangeError(`lower must be >= 0, got ${lower}`);
  if (!(upper >= 0)) throw new RangeError(`upper must be >= 0, got ${upper}`);
  const suffix = unit === '' ? '' : `${THIN_SPACE}${unit}`;
  if (lower === 0 && upper === 0) return `${formatPlain(value)}${suffix}`;
  const smallest = Math.min(lower || upper, upper || lower);
  const decimals = errorDecimals(smallest);
  const fixed = (x: number) => withMinus(x.toFixed(decimals));
  if (fixed(lower) === fixed(upper)) return `${fixed(value)} ± ${fixed(upper)}${suffix}`;
  return `${fixed(value)} +${fixed(upper)} ${MINUS}${fixed(lower)}${suffix}`;
}

/** Decimals of a value and its error > 0: two figures of the error, no more than a whole number needs. */
export function errorDecimals(error: number): number {
  const twoFigures = Math.max(0, 1 - Math.floor(Math.log10(error)));
  const text = error.toFixed(Math.min(twoFigures, 20));
  return text.includes('.') ? text.replace(/0+$/, '').split('.')[1].length : 0;
}

/**
 * The words that go with an index, since −1.3 per M and −1.3 per ln M are different laws.
 *
 * @param variable what the index belongs to
 * @param convention linear: dN/dM; log: dN/d ln M
 * @returns 'dN/dM ∝ M^α', 'dN/d ln a ∝ a^β' …
 */
export function describeIndexConvention(
  variable: 'mass' | 'semi-major axis',
  convention: QuotedConvention,
): string {
  const [symbol, index] = variable === 'mass' ? ['M', 'α'] : ['a', 'β'];
  const step = convention === 'linear' ? `d${symbol}` : `d ln ${symbol}`;
  return `dN/${step} ∝ ${symbol}^${index}`;
}

function withMinus(text: string): string {
  return text.replaceAll('-', MINUS);
}
