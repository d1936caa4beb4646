import { interpolateLinear } from '@/lib/numerics/interpolate';
import type { ContrastCurve, UnvettedCandidate } from './types';

/** Width of an edge in ln θ: so narrow that every integral takes it as a jump. */
const EDGE = 5e-8;

/**
 * A curve cut where sources lie of which nobody knows whether they are bound.
 *
 * Over the annulus within the half-width of a source's separation the limit is at most as faint as
 * the source: companions like it or fainter cannot be said to be absent there, at any position
 * angle, as the curve does not tell one angle from another (our rule, on the safe side). A source
 * without a contrast, or with one in another band, takes the annulus out: coverage 0. The edges are
 * upright, the curve beyond them stays as it is. A source beyond the curve changes nothing.
 *
 * @param curve as checkContrastCurve accepts it, not modified
 * @param sources see UnvettedCandidate; the order does not matter
 * @param halfWidthArcsec half-width of the annulus, [arcsec], > 0
 * @returns the curve, a new one where a source lies on it
 * @throws RangeError for a separation or half-width not > 0, or a contrast that is < 0 or not finite
 */
export function cutAtCandidates(
  curve: ContrastCurve,
  sources: readonly UnvettedCandidate[],
  halfWidthArcsec: number,
): ContrastCurve {
  let cut = curve;
  for (const source of sources) cut = cutAtOne(cut, source, halfWidthArcsec);
  return cut;
}

function cutAtOne(
  curve: ContrastCurve,
  source: UnvettedCandidate,
  halfWidthArcsec: number,
): ContrastCurve {
  requireSource(source, halfWidthArcsec);
  const { separationArcsec: separation, contrastMag, coverage } = curve;
  const logs = separation.map(Math.log);
  const [first, last] = [logs[0], logs[logs.length - 1]];
  const inner = source.separationArcsec - halfWidthArcsec;
  const from = inner > 0 ? Math.max(first, Math.log(inner)) : first;
  const to = Math.min(last, Math.log(source.separationArcsec + halfWidthArcsec));
  if (!(to - from > 4 * EDGE)) return curve;
  const limitAt = (y: number) => interpolateLinear(y, logs, contrastMag);
  const coverageAt = (y: number) => (coverage ? interpolateLinear(y, logs, coverage) : 1);
  const isSameBand = source.band === undefined || source.band === curve.band;
  const faintest = isSameBand ? source.contrastMag : undefined;

  const kept = (y: number) => ({ y, limit: limitAt(y), coverage: coverageAt(y) });
  const cut = (y: number) =>
    faintest === undefined
      ? { ...kept(y), coverage: 0 }
      : { ...kept(y), limit: Math.min(faintest, limitAt(y)) };
  const inside = [...logs, ...crossings(logs, contrastMag, faintest)]
    .filter((y) => y > from + EDGE && y < to - EDGE)
    .sort((a, b) => a - b);
  const points = [
    ...Array.from(
      logs.filter((y) => y < from - EDGE),
      kept,
    ),
    ...(from > first ? [kept(from)] : []),
    ...[from > first ? from + EDGE : from, ...inside, to < last ? to - EDGE : to].map(cut),
    ...(to < last ? [kept(to)] : []),
    ...Array.from(
      logs.filter((y) => y > to + EDGE),
      kept,
    ),
  ].filter(({ y }, i, all) => i === 0 || y > all[i - 1].y);
  return {
    ...curve,
    separationArcsec: Float64Array.from(points, ({ y }) => Math.exp(y)),
    contrastMag: Float64Array.from(points, ({ limit }) => limit),
    ...((coverage || faintest === undefined) && {
      coverage: Float64Array.from(points, (point) => point.coverage),
    }),
  };
}

/** Where the curve passes the source's contrast, so that the lower of the two has its corner. */
function crossings(
  logs: Float64Array,
  contrastMag: Float64Array,
  faintest: number | undefined,
): number[] {
  if (faintest === undefined) return [];
  const found: number[] = [];
  for (let i = 0; i + 1 < logs.length; i++) {
    const share = (faintest - contrastMag[i]) / (contrastMag[i + 1] - contrastMag[i]);
    if (share > 0 && share < 1) found.push(logs[i] + share * (logs[i + 1] - logs[i]));
  }
  return found;
}

function requireSource(source: UnvettedCandidate, halfWidthArcsec: number): void {
  const { separationArcsec, contrastMag } = source;
  const positive = { separationArcsec, halfWidthArcsec };
  for (const [name, value] of Object.entries(positive)) {
    if (!(value > 0 && Number.isFinite(value))) {
      throw new RangeError(`${name} of a candidate must be finite and > 0, got ${value}`);
    }
  }
  if (contrastMag !== undefined && !(contrastMag >= 0 && Number.isFinite(contrastMag))) {
    throw new RangeError(`contrastMag of a candidate must be finite and >= 0, got ${contrastMag}`);
  }
}
