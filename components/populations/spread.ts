import type { MapData } from '@/components/charts/map-contours';
import type { LiveSample } from '@/components/runs/live-sample';
import {
  hostScalingOf,
  marginalWeights,
  needsHostMass,
  type Population,
  type PopulationBox,
  type PopulationWeights,
  populationBox,
  sampleBox,
} from '@/lib/population';

/** Masses of the sample's stars, shape [star] [M_Sun]; NaN where none is known. */
export function hostMassesOf(sample: LiveSample): Float64Array {
  return Float64Array.from(sample.stars, ({ hostMassMsun }) => hostMassMsun ?? Number.NaN);
}

/** Where a population's companions lie on a sample's maps: over all stars, each by its rate. */
export interface Spread {
  box: PopulationBox;
  /** Per axis, over all stars that count. */
  weights: PopulationWeights;
  /** Mean completeness of those stars, each by its share. */
  map: MapData;
  /** Stars that count: all, or those whose mass is known where it is needed. */
  star: Int32Array;
  /** Share of the companions that each of them has, summing to 1. */
  share: Float64Array;
  /** Mass ratio alone: weights in mass of each star that counts. */
  massOf: Float64Array[] | null;
}

/**
 * @param meanMap plain mean over all stars of the sample
 * @returns null where the population needs host masses and none is known
 * @throws RangeError for a population that cannot be used
 */
export function spreadOf(
  sample: LiveSample,
  meanMap: MapData,
  population: Population,
): Spread | null {
  const masses = hostMassesOf(sample);
  const star = Int32Array.from(
    Array.from(masses.keys()).filter((j) => !needsHostMass(population) || masses[j] > 0),
  );
  const box =
    population.form === 'mass-ratio' ? sampleBox(population, masses) : populationBox(population);
  if (star.length === 0 || box === null) return null;
  const scaling = hostScalingOf(population);
  const rate = Float64Array.from(star, (j) =>
    scaling === null ? 1 : (masses[j] / scaling.referenceMsun) ** scaling.index,
  );
  const whole = rate.reduce((sum, own) => sum + own, 0);
  const share = rate.map((own) => own / whole);
  const isPlain = scaling === null && star.length === sample.stars.length;
  const map = isPlain ? meanMap : meanOfStars(sample, star, share);
  if (population.form !== 'mass-ratio') {
    const weights = marginalWeights(sample.grid, population);
    return { box, weights, map, star, share, massOf: null };
  }
  const known = new Map<number, PopulationWeights>();
  const own = Array.from(star, (j) => {
    const weights = known.get(masses[j]) ?? marginalWeights(sample.grid, population, masses[j]);
    known.set(masses[j], weights);
    return weights;
  });
  const mass = new Float64Array(sample.grid.massMjup.length);
  let shareOutsideMap = 0;
  own.forEach((weights, i) => {
    for (let row = 0; row < mass.length; row++) mass[row] += share[i] * weights.mass[row];
    shareOutsideMap += share[i] * weights.shareOutsideMap;
  });
  const weights = { mass, semiMajorAxis: own[0].semiMajorAxis, shareOutsideMap };
  return { box, weights, map, star, share, massOf: own.map((one) => one.mass) };
}

function meanOfStars(sample: LiveSample, star: Int32Array, share: Float64Array): MapData {
  const size = sample.grid.massMjup.length * sample.grid.semiMajorAxisAu.length;
  const completeness = new Float64Array(size);
  star.forEach((j, i) => {
    const scale = share[i] / 65_535;
    for (let node = 0; node < size; node++) {
      completeness[node] += scale * sample.maps[j * size + node];
    }
  });
  return { ...sample.grid, completeness };
}
