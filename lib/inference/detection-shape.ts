import { powerLawIntegral } from '@/lib/numerics/special';
import {
  type Population,
  type PopulationBox,
  populationBox,
  populationDensity,
} from '@/lib/population';
import { type MeasuredDetection, type MeasuredPlaces, measuredPlaces } from './measured-places';

/**
 * Density of a population where a companion was found, averaged over what is known of it.
 *
 * It is the factor of the detection in the likelihood, beside the rate: whether the companion could
 * be seen is not in it, because that depends on the data, which are given.
 *
 * @param population any with a density: not a table of systems
 * @param hostMassMsun M_j [M_Sun]: needed for the mass ratio alone
 * @returns per d ln m d ln a, >= 0; 0 where no place lies in the ranges
 * @throws RangeError as `measuredPlaces`, and for a population that cannot be used
 * Accuracy: 7 nodes an axis; a density cut by the ranges within the errors is followed by steps.
 * @source Loredo 2004, AIP Conf. Proc. 735, 195; Mandel, Farr & Gair 2019, MNRAS 486, 1086
 */
export function detectionShape(
  population: Population,
  detection: MeasuredDetection,
  hostMassMsun?: number,
): number {
  const places = measuredPlaces(detection, populationBox(population, hostMassMsun));
  const densityAt = (massMjup: number, semiMajorAxisAu: number) =>
    populationDensity(population, massMjup, semiMajorAxisAu, hostMassMsun);
  let sum = 0;
  if (places.form === 'joint') {
    for (let i = 0; i < places.weight.length; i++) {
      const [m, a] = [places.massMjup[i], places.semiMajorAxisAu[i]];
      sum += places.weight[i] * densityAt(m, a);
    }
    return sum;
  }
  const { mass, semiMajorAxis } = places;
  for (let i = 0; i < mass.at.length; i++) {
    for (let j = 0; j < semiMajorAxis.at.length; j++) {
      const share = mass.weight[i] * semiMajorAxis.weight[j];
      sum += share * densityAt(mass.at[i], semiMajorAxis.at[j]);
    }
  }
  return sum;
}

/** ln of the weighted sum of x^index, for every index. */
function logMoments(logAt: Float64Array, weight: Float64Array, indices: Float64Array) {
  const pivot = logAt.reduce((sum, y) => sum + y, 0) / Math.max(1, logAt.length);
  return indices.map((index) => {
    let sum = 0;
    for (let i = 0; i < logAt.length; i++) sum += weight[i] * Math.exp(index * (logAt[i] - pivot));
    return Math.log(sum) + index * pivot;
  });
}

/** Weighted powers shape [index, place], scaled by exp(-index pivot). */
function powers(at: Float64Array, indices: Float64Array, pivot: number): Float64Array {
  const values = new Float64Array(indices.length * at.length);
  for (let k = 0; k < indices.length; k++) {
    for (let i = 0; i < at.length; i++) {
      values[k * at.length + i] = Math.exp(indices[k] * (Math.log(at[i]) - pivot));
    }
  }
  return values;
}

function jointLogMoments(
  places: Extract<MeasuredPlaces, { form: 'joint' }>,
  massIndices: Float64Array,
  axisIndices: Float64Array,
): Float64Array {
  const { massMjup, semiMajorAxisAu, weight } = places;
  const n = weight.length;
  const pivotOf = (at: Float64Array) =>
    at.reduce((sum, x) => sum + Math.log(x), 0) / Math.max(1, n);
  const [massPivot, axisPivot] = [pivotOf(massMjup), pivotOf(semiMajorAxisAu)];
  const inMass = powers(massMjup, massIndices, massPivot);
  const inAxis = powers(semiMajorAxisAu, axisIndices, axisPivot);
  const logs = new Float64Array(massIndices.length * axisIndices.length);
  for (let i = 0; i < massIndices.length; i++) {
    for (let j = 0; j < axisIndices.length; j++) {
      let sum = 0;
      for (let s = 0; s < n; s++) sum += weight[s] * inMass[i * n + s] * inAxis[j * n + s];
      logs[i * axisIndices.length + j] =
        Math.log(sum) + massIndices[i] * massPivot + axisIndices[j] * axisPivot;
    }
  }
  return logs;
}

/**
 * ln of `detectionShape` for power laws in mass and semi-major axis, at every pair of indices.
 *
 * @param massIndices alpha per d ln m, shape [n]
 * @param axisIndices beta per d ln a, shape [p]
 * @returns shape [n, p], row-major; -Infinity everywhere where no place lies in the ranges
 * @throws RangeError as `measuredPlaces`
 */
export function logDetectionShapes(
  ranges: PopulationBox,
  detection: MeasuredDetection,
  massIndices: Float64Array,
  axisIndices: Float64Array,
): Float64Array {
  const places = measuredPlaces(detection, ranges);
  const { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu } = ranges;
  const normMass = massIndices.map((index) =>
    Math.log(powerLawIntegral(index, massMinMjup, massMaxMjup)),
  );
  const normAxis = axisIndices.map((index) =>
    Math.log(powerLawIntegral(index, semiMajorAxisMinAu, semiMajorAxisMaxAu)),
  );
  const columns = axisIndices.length;
  if (places.form === 'joint') {
    return jointLogMoments(places, massIndices, axisIndices).map(
      (value, at) => value - normMass[Math.floor(at / columns)] - normAxis[at % columns],
    );
  }
  const { mass, semiMajorAxis } = places;
  const inMass = logMoments(mass.at.map(Math.log), mass.weight, massIndices);
  const inAxis = logMoments(semiMajorAxis.at.map(Math.log), semiMajorAxis.weight, axisIndices);
  const logs = new Float64Array(massIndices.length * columns);
  for (let i = 0; i < massIndices.length; i++) {
    for (let j = 0; j < columns; j++) {
      logs[i * columns + j] = inMass[i] - normMass[i] + inAxis[j] - normAxis[j];
    }
  }
  return logs;
}
