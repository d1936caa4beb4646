/** Above this fractional error the inverse of a parallax is a biased distance (Bailer-Jones 2015). */
const BIASED_PARALLAX_ERROR = 0.1;

/**
 * Distance modulus, μ = 5 log10(d) - 5.
 *
 * @param distancePc d, [pc], > 0
 * @returns μ, [mag]
 * @throws RangeError for d <= 0 or not finite
 * @example distanceModulus(100) // 5
 */
export function distanceModulus(distancePc: number): number {
  requirePositive(distancePc, 'distancePc');
  return 5 * Math.log10(distancePc) - 5;
}

/**
 * Distance from a parallax, d = 1000 / p.
 *
 * @param parallaxMas p, [mas], > 0
 * @returns d, [pc]
 * @throws RangeError for p <= 0 or not finite
 * @example distancePcFromParallax(50) // 20
 */
export function distancePcFromParallax(parallaxMas: number): number {
  requirePositive(parallaxMas, 'parallaxMas');
  return 1000 / parallaxMas;
}

/**
 * Whether 1/p is a biased distance, so that a distance with its own error should be given instead.
 *
 * @param parallaxMas p, [mas], > 0
 * @param errorMas standard error of p, [mas], >= 0
 * @source Bailer-Jones 2015, PASP 127, 994
 */
export function isParallaxBiased(parallaxMas: number, errorMas: number): boolean {
  return errorMas / parallaxMas > BIASED_PARALLAX_ERROR;
}

/**
 * Absolute magnitude, M = m - μ - A.
 *
 * @param apparentMag m, [mag]
 * @param distancePc d, [pc], > 0
 * @param extinctionMag A in the band, [mag], default 0
 * @throws RangeError for d <= 0
 */
export function absoluteMagnitude(
  apparentMag: number,
  distancePc: number,
  extinctionMag = 0,
): number {
  return apparentMag - distanceModulus(distancePc) - extinctionMag;
}

/**
 * Apparent magnitude, m = M + μ + A: the inverse of absoluteMagnitude.
 *
 * @throws RangeError for d <= 0
 */
export function apparentMagnitude(
  absoluteMag: number,
  distancePc: number,
  extinctionMag = 0,
): number {
  return absoluteMag + distanceModulus(distancePc) + extinctionMag;
}

/**
 * Flux of the companion over flux of the star, 10^(-0.4 Δm).
 *
 * @param contrastMag Δm, companion minus star, [mag], >= 0
 * @throws RangeError for Δm < 0: a companion brighter than its star
 * @example fluxRatio(12.5) // 1e-5
 */
export function fluxRatio(contrastMag: number): number {
  if (!(contrastMag >= 0)) throw new RangeError(`contrastMag must be >= 0, got ${contrastMag}`);
  return 10 ** (-0.4 * contrastMag);
}

/**
 * Magnitude difference of a flux ratio, Δm = -2.5 log10 r.
 *
 * @param ratio r, companion over star, 0 < r < 1
 * @returns Δm, [mag], > 0
 * @throws RangeError for a ratio outside its domain
 * @example contrastMagFromFluxRatio(1e-5) // 12.5
 */
export function contrastMagFromFluxRatio(ratio: number): number {
  if (!(ratio > 0 && ratio < 1)) {
    throw new RangeError(`ratio must be above 0 and below 1, got ${ratio}`);
  }
  return -2.5 * Math.log10(ratio);
}

/**
 * Error of a magnitude from the relative error of its flux, σ_m = 2.5 / ln 10 · σ_f / f.
 *
 * @param relativeError σ_f / f, >= 0; a good approximation while it is small
 * @returns σ_m, [mag]
 * @throws RangeError for a negative error
 */
export function magnitudeError(relativeError: number): number {
  if (!(relativeError >= 0))
    throw new RangeError(`relativeError must be >= 0, got ${relativeError}`);
  return (2.5 / Math.LN10) * relativeError;
}

/**
 * Relative error of a flux from the error of its magnitude: the inverse of magnitudeError.
 *
 * @param errorMag σ_m, [mag], >= 0
 * @throws RangeError for a negative error
 */
export function relativeFluxError(errorMag: number): number {
  if (!(errorMag >= 0)) throw new RangeError(`errorMag must be >= 0, got ${errorMag}`);
  return (Math.LN10 / 2.5) * errorMag;
}

function requirePositive(value: number, name: string): void {
  if (!(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`${name} must be finite and > 0, got ${value}`);
  }
}
