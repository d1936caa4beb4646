import { requirePositiveAxis } from '@/lib/numerics/grid';
import { interpolateLinear } from '@/lib/numerics/interpolate';
import { normalCumulative } from '@/lib/numerics/normal';
import type { ContrastCurve, SensitivitySettings } from './types';

/**
 * Refuses a curve that cannot be used.
 *
 * @param curve see ContrastCurve, not modified
 * @param name how errors call it
 * @throws RangeError for fewer than 2 points, separations not increasing, Δm < 0 or not finite,
 *   n <= 0, or a coverage outside 0 to 1
 */
export function checkContrastCurve(curve: ContrastCurve, name: string): void {
  const { separationArcsec, contrastMag, coverage, nSigma } = curve;
  requirePositiveAxis(separationArcsec, `separationArcsec of ${name}`);
  const n = separationArcsec.length;
  if (contrastMag.length !== n) {
    throw new RangeError(`contrastMag of ${name} must have ${n} values, got ${contrastMag.length}`);
  }
  if (coverage !== undefined && coverage.length !== n) {
    throw new RangeError(`coverage of ${name} must have ${n} values, got ${coverage.length}`);
  }
  if (!(nSigma > 0 && Number.isFinite(nSigma))) {
    throw new RangeError(`nSigma of ${name} must be finite and > 0, got ${nSigma}`);
  }
  for (let i = 0; i < n; i++) {
    const contrast = contrastMag[i];
    if (!(contrast >= 0 && Number.isFinite(contrast))) {
      throw new RangeError(`contrastMag[${i}] of ${name} must be finite and >= 0, got ${contrast}`);
    }
    const share = coverage?.[i] ?? 1;
    if (!(share >= 0 && share <= 1)) {
      throw new RangeError(`coverage[${i}] of ${name} must be between 0 and 1, got ${share}`);
    }
  }
}

/**
 * The curve at one separation, linear in ln θ; null beyond its ends, where nothing is detected.
 *
 * @param curve as checkContrastCurve accepts it
 * @param separationArcsec θ, [arcsec], > 0
 */
export function contrastAt(
  curve: ContrastCurve,
  separationArcsec: number,
): { contrastMag: number; coverage: number } | null {
  const axis = curve.separationArcsec;
  if (!(separationArcsec >= axis[0] && separationArcsec <= axis[axis.length - 1])) return null;
  const logs = axis.map(Math.log);
  const y = Math.log(separationArcsec);
  return {
    contrastMag: interpolateLinear(y, logs, curve.contrastMag),
    coverage: curve.coverage ? interpolateLinear(y, logs, curve.coverage) : 1,
  };
}

/**
 * P(detected) of a companion against a limit at its place.
 *
 * hard: 1 if the limit is at least as faint, else 0; smooth: Φ(n (10^(0.4 (limit - Δm)) - 1)),
 * Gaussian noise with the threshold at n times its σ.
 *
 * @param limitMag faintest detectable difference there, [mag]
 * @param contrastMag Δm of the companion, [mag]; Infinity is no signal
 * @param nSigma n, > 0
 * @param threshold rule
 * @returns 0 to 1; at the limit 1 (hard) or 1/2 (smooth); for no signal Φ(-n) under smooth
 * @source true-positive fraction as in Jensen-Clem et al. 2018, AJ 155, 19
 * @example detectionProbability(13, 12.5, 5, 'smooth') // 0.99827476
 */
export function detectionProbability(
  limitMag: number,
  contrastMag: number,
  nSigma: number,
  threshold: SensitivitySettings['threshold'],
): number {
  if (threshold === 'hard') return limitMag >= contrastMag ? 1 : 0;
  return normalCumulative(nSigma * (10 ** (0.4 * (limitMag - contrastMag)) - 1));
}
