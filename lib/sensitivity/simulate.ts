import { interpolateLinear } from '@/lib/numerics/interpolate';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import { distanceModulus } from '@/lib/quantities/magnitudes';
import { ageDraw } from './age';
import { detectionProbability } from './contrast';
import { coolNodes } from './cooling';
import { distanceAt } from './distance';
import { eccentricityQuantile } from './eccentricity';
import { ageUnder } from './field-age';
import { eccentricAnomaly, trueAnomaly } from './kepler';
import { prepareStar } from './star-model';
import type { CoolingRelation, SensitivitySettings, StarInputs } from './types';
import { isRemoved } from './unstable-zone';

const TURN = 2 * Math.PI;

/**
 * Completeness of one cell by simulation: companions are drawn, placed on their orbits and looked
 * for. A cross-check of computeCompletenessMap that shares none of its integrals.
 *
 * Draws e, mean anomaly, ω, cos i, age and distance; solves Kepler's equation; projects with
 * r √(1 - sin²(ω + ν) sin² i); counts detections. Ages beyond the cooling relation are drawn only
 * where its age nodes lie inside, and take its nearest age; distances are drawn again until > 0.
 *
 * @param star see StarInputs
 * @param cooling built-in law or table
 * @param massMjup companion mass, [M_Jup], > 0
 * @param semiMajorAxisAu semi-major axis, [au], > 0
 * @param settings as for the map
 * @param draws number of companions, integer >= 1
 * @param seed any text; the same seed gives the same answer
 * @returns completeness and its standard error √(C(1 - C)/n)
 * @throws RangeError for anything outside its domain, as computeCompletenessMap does
 * Cost: 1 µs a draw and curve.
 */
export function simulateCompleteness(
  star: StarInputs,
  cooling: CoolingRelation,
  massMjup: number,
  semiMajorAxisAu: number,
  settings: SensitivitySettings,
  draws: number,
  seed: string,
): { completeness: number; standardError: number } {
  if (!Number.isInteger(draws) || draws < 1) {
    throw new RangeError(`draws must be an integer >= 1, got ${draws}`);
  }
  if (!(semiMajorAxisAu > 0 && Number.isFinite(semiMajorAxisAu))) {
    throw new RangeError(`semiMajorAxisAu must be finite and > 0, got ${semiMajorAxisAu}`);
  }
  const mass = Float64Array.of(massMjup);
  const { curves } = prepareStar(star, cooling, mass, settings);
  if (isRemoved(star, settings, semiMajorAxisAu)) return { completeness: 0, standardError: 0 };
  const magnitudes = drawMagnitudes(star, cooling, mass, settings, draws, seed);
  const random = createRandom(deriveSeed(seed, 'orbits'));
  const eccentricity = eccentricityQuantile(settings.eccentricity);
  const distance = drawDistance(star, random.normal);
  const axes = curves.map((curve) => ({ ...curve, last: curve.logSeparation.length - 1 }));
  let found = 0;
  for (let draw = 0; draw < draws; draw++) {
    const e = eccentricity(random.uniform());
    const anomaly = eccentricAnomaly(TURN * random.uniform(), e);
    const angle = TURN * random.uniform() + trueAnomaly(anomaly, e);
    const cosine = random.uniform();
    const distancePc = distance();
    const radius = 1 - e * Math.cos(anomaly);
    const rho = radius * Math.sqrt(1 - Math.sin(angle) ** 2 * (1 - cosine * cosine));
    const y = Math.log((rho * semiMajorAxisAu) / distancePc);
    const modulus = distanceModulus(distancePc);
    let missed = 1;
    for (let s = 0; s < axes.length; s++) {
      const { logSeparation, limitMag, coverage, nSigma, last } = axes[s];
      if (y < logSeparation[0] || y > logSeparation[last]) continue;
      const magnitude = magnitudes[s][draw];
      if (magnitude === Infinity) continue;
      const limit = interpolateLinear(y, logSeparation, limitMag);
      const p = detectionProbability(limit, magnitude + modulus, nSigma, settings.threshold);
      missed *= 1 - p * interpolateLinear(y, logSeparation, coverage);
    }
    if (random.uniform() >= missed) found++;
  }
  const completeness = found / draws;
  return { completeness, standardError: Math.sqrt((completeness * (1 - completeness)) / draws) };
}

/** Absolute magnitude per curve and draw: one age per draw, shared by the curves. */
function drawMagnitudes(
  star: StarInputs,
  cooling: CoolingRelation,
  mass: Float64Array,
  settings: SensitivitySettings,
  draws: number,
  seed: string,
): Float64Array[] {
  const { uniform } = createRandom(deriveSeed(seed, 'ages'));
  const ageAt = ageDraw(ageUnder(star, settings));
  const ages = new Float64Array(draws).map(() => ageAt(uniform()));
  const policy = { massOutsideTable: settings.massOutsideTable, ageOutsideTable: 'edge' } as const;
  return star.curves.map(
    (curve) => coolNodes(cooling, curve.band, mass, ages, policy, star.name).magnitudes,
  );
}

function drawDistance(star: StarInputs, normal: () => number): () => number {
  const law = star.distance;
  const [value, error] =
    'distancePc' in law ? [law.distancePc, law.errorPc] : [law.parallaxMas, law.errorMas];
  const at = distanceAt(law);
  if (error === 0) return () => at(0);
  return () => {
    let z = normal();
    while (!(value + error * z > 0)) z = normal();
    return at(z);
  };
}
