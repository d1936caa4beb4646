import { intervalIndex } from '@/lib/numerics/grid';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import { distanceModulus } from '@/lib/quantities/magnitudes';
import { ageDraw, builtInMagnitude, eccentricAnomaly, type StarInputs } from '@/lib/sensitivity';
import { eccentricityQuantile } from '@/lib/sensitivity/eccentricity';
import { BAND, GRID, SEED, settings } from './survey';

/** Absolute magnitudes of the grid's masses at many ages, shape [age, mass], heavier is brighter. */
interface MagnitudeTable {
  agesMyr: Float64Array;
  magnitudes: Float64Array;
}

let magnitudeTable: MagnitudeTable | null = null;

/** Worked out once and outside the timed part: the yardstick has the relation for nothing. */
export function prepareYardstick(): MagnitudeTable {
  if (magnitudeTable) return magnitudeTable;
  const agesMyr = Float64Array.from({ length: 241 }, (_, i) => 10 ** (i / 60));
  const masses = GRID.massMjup.length;
  const magnitudes = new Float64Array(agesMyr.length * masses);
  agesMyr.forEach((age, k) => {
    GRID.massMjup.forEach((mass, i) => {
      magnitudes[k * masses + i] = builtInMagnitude(mass, Math.min(age, 10_000), BAND);
      if (i > 0 && magnitudes[k * masses + i] >= magnitudes[k * masses + i - 1]) {
        throw new RangeError(`the search over mass needs heavier to be brighter at ${age} Myr`);
      }
    });
  });
  magnitudeTable = { agesMyr, magnitudes };
  return magnitudeTable;
}

/**
 * Completeness by plain Monte Carlo: every draw is one orbit, age, distance and noise, used in every
 * cell, so that a cell costs a look-up in the curve shared by all masses.
 *
 * @returns shape [mass, semiMajorAxis]; standard error √(C(1 - C)/draws)
 */
export function monteCarloMap(
  star: StarInputs,
  threshold: 'hard' | 'smooth',
  draws: number,
): Float64Array {
  const { magnitudes } = prepareYardstick();
  const { uniform, normal } = createRandom(deriveSeed(SEED, `draws of ${star.name}`));
  if (!('distancePc' in star.distance)) throw new RangeError(`${star.name} needs a distance`);
  const { distancePc, errorPc } = star.distance;
  const [curve] = star.curves;
  const logSeparation = curve.separationArcsec.map(Math.log);
  const last = logSeparation.length - 1;
  const logAxis = GRID.semiMajorAxisAu.map(Math.log);
  const eccentricity = eccentricityQuantile(settings(threshold).eccentricity);
  const ageOf = ageDraw(star.age);
  const [masses, columns] = [GRID.massMjup.length, logAxis.length];
  const counts = new Float64Array(masses * columns);
  const bodies = new Float64Array(masses);
  for (let draw = 0; draw < draws; draw++) {
    const e = eccentricity(uniform());
    const radius = 1 - e * Math.cos(eccentricAnomaly(2 * Math.PI * uniform(), e));
    const cosine = uniform();
    const distance = distancePc + errorPc * normal();
    const y = Math.log((radius * Math.sqrt(1 - cosine * cosine)) / distance);
    const place = 60 * Math.log10(ageOf(uniform()));
    const k = Math.floor(place);
    const share = place - k;
    for (let i = 0; i < masses; i++) {
      const here = magnitudes[k * masses + i];
      bodies[i] = here + share * (magnitudes[(k + 1) * masses + i] - here);
    }
    // Smooth rule: found when signal and noise together exceed n sigma.
    const noise = threshold === 'smooth' ? 1 + normal() / curve.nSigma : 1;
    const gain = noise > 0 ? 2.5 * Math.log10(noise) : -Infinity;
    const offset = star.hostMag - distanceModulus(distance) - gain;
    const turn = uniform();
    for (let j = 0; j < columns; j++) {
      const at = y + logAxis[j];
      if (at < logSeparation[0] || at > logSeparation[last]) continue;
      const s = intervalIndex(logSeparation, at);
      const t = (at - logSeparation[s]) / (logSeparation[s + 1] - logSeparation[s]);
      const { contrastMag, coverage } = curve;
      if (coverage && turn > coverage[s] + t * (coverage[s + 1] - coverage[s])) continue;
      const limit = offset + contrastMag[s] + t * (contrastMag[s + 1] - contrastMag[s]);
      let low = 0;
      let high = masses;
      while (low < high) {
        const middle = (low + high) >> 1;
        if (bodies[middle] <= limit) high = middle;
        else low = middle + 1;
      }
      if (low < masses) counts[low * columns + j]++;
    }
  }
  for (let i = columns; i < counts.length; i++) counts[i] += counts[i - columns];
  return counts.map((count) => count / draws);
}

/** ln L of the host fraction at one f, a log1p a star. */
function logLikelihood(f: number, completeness: Float64Array, isDetected: Uint8Array): number {
  let sum = 0;
  for (let j = 0; j < completeness.length; j++) {
    sum += isDetected[j] ? Math.log(f) : Math.log1p(-f * completeness[j]);
  }
  return sum;
}

/**
 * Upper limit under a uniform prior on [0, 1] from equally spaced points and the trapezoid rule.
 *
 * @param range part of [0, 1] to cover; the rest counts as nothing
 */
export function gridLimit(
  completeness: Float64Array,
  detectedStars: readonly number[],
  level: number,
  points: number,
  range: readonly [number, number] = [0, 1],
): { limit: number; range: [number, number] } {
  const isDetected = new Uint8Array(completeness.length);
  for (const star of detectedStars) isDetected[star] = 1;
  const step = (range[1] - range[0]) / (points - 1);
  const at = (i: number) => range[0] + i * step;
  const logs = new Float64Array(points).map((_, i) =>
    logLikelihood(at(i), completeness, isDetected),
  );
  const peak = logs.reduce((a, b) => Math.max(a, b));
  const density = logs.map((value) => Math.exp(value - peak));
  const cumulative = new Float64Array(points);
  for (let i = 1; i < points; i++) {
    cumulative[i] = cumulative[i - 1] + 0.5 * step * (density[i - 1] + density[i]);
  }
  const wanted = level * cumulative[points - 1];
  const i = Math.max(0, cumulative.findIndex((area) => area >= wanted) - 1);
  const limit = at(i) + (step * (wanted - cumulative[i])) / (cumulative[i + 1] - cumulative[i]);
  const isSeen = (value: number) => value > peak - 40;
  const first = Math.max(0, logs.findIndex(isSeen) - 1);
  const end = Math.min(points - 1, points - logs.reverse().findIndex(isSeen));
  return { limit, range: [at(first), at(end)] };
}
