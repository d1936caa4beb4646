const TURN = 2 * Math.PI;

/**
 * Eccentric anomaly E of Kepler's equation, E - e sin E = M.
 *
 * Newton's method kept inside a bracket that halves when a step would leave it, so that it also
 * ends near e = 1, M = 0, where Newton alone runs away.
 *
 * @param meanAnomaly M, [rad], finite; whole turns are kept: E(M + 2π) = E(M) + 2π
 * @param eccentricity e, 0 <= e < 1
 * @returns E, [rad]
 * @throws RangeError for e outside its domain or M not finite
 * Accuracy: 1e-12 rad. Cost: 3 to 6 steps, more near e = 1.
 * @source Meeus 1998, Astronomical Algorithms, chapter 30 (worked examples in the tests)
 * @example eccentricAnomaly(0.2, 0.99) // 1.066997365
 */
export function eccentricAnomaly(meanAnomaly: number, eccentricity: number): number {
  requireEccentricity(eccentricity);
  if (!Number.isFinite(meanAnomaly)) {
    throw new RangeError(`meanAnomaly must be finite, got ${meanAnomaly}`);
  }
  const turns = Math.round(meanAnomaly / TURN);
  const reduced = meanAnomaly - turns * TURN;
  const size = solveHalfTurn(Math.abs(reduced), eccentricity);
  return (reduced < 0 ? -size : size) + turns * TURN;
}

/** Kepler's equation for 0 <= M <= π. */
function solveHalfTurn(mean: number, e: number): number {
  if (mean === 0 || e === 0) return mean;
  let low = mean;
  let high = Math.min(mean + e, Math.PI);
  let anomaly = Math.min(high, mean + (e * Math.sin(mean)) / (1 - e * Math.cos(mean)) || high);
  if (!(anomaly >= low)) anomaly = 0.5 * (low + high);
  for (let step = 0; step < 100; step++) {
    const excess = anomaly - e * Math.sin(anomaly) - mean;
    if (excess > 0) high = anomaly;
    else low = anomaly;
    let next = anomaly - excess / (1 - e * Math.cos(anomaly));
    if (!(next >= low && next <= high)) next = 0.5 * (low + high);
    if (Math.abs(next - anomaly) <= 1e-15 * (1 + anomaly)) return next;
    anomaly = next;
  }
  return anomaly;
}

/**
 * True anomaly ν of an eccentric anomaly E.
 *
 * @param anomaly E, [rad]
 * @param eccentricity e, 0 <= e < 1
 * @returns ν, [rad], -π to π
 * @throws RangeError for e outside its domain
 */
export function trueAnomaly(anomaly: number, eccentricity: number): number {
  requireEccentricity(eccentricity);
  return Math.atan2(
    Math.sqrt(1 - eccentricity * eccentricity) * Math.sin(anomaly),
    Math.cos(anomaly) - eccentricity,
  );
}

/** @throws RangeError unless 0 <= e < 1 */
export function requireEccentricity(e: number): void {
  if (!(e >= 0 && e < 1)) throw new RangeError(`eccentricity must be >= 0 and < 1, got ${e}`);
}
