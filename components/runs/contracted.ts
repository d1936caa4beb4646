import type { PopulationWeights } from '@/lib/population';
import type { LiveSample } from './live-sample';

export type MovingAxis = 'mass' | 'semiMajorAxis';

/**
 * Maps summed over the axis that stands still, so that moving the other costs one row a star.
 *
 * @returns shape [star, node of the moving axis], [fraction]
 */
export function contract(
  sample: LiveSample,
  weights: PopulationWeights,
  moving: MovingAxis,
): Float64Array {
  const rows = sample.grid.massMjup.length;
  const columns = sample.grid.semiMajorAxisAu.length;
  const stars = sample.maps.length / (rows * columns);
  const nodes = moving === 'mass' ? rows : columns;
  const result = new Float64Array(stars * nodes);
  for (let star = 0; star < stars; star++) {
    for (let row = 0; row < rows; row++) {
      const start = (star * rows + row) * columns;
      if (moving === 'mass') {
        let sum = 0;
        for (let column = 0; column < columns; column++) {
          sum += sample.maps[start + column] * weights.semiMajorAxis[column];
        }
        result[star * nodes + row] = sum / 65_535;
      } else {
        const weight = weights.mass[row] / 65_535;
        if (weight === 0) continue;
        for (let column = 0; column < columns; column++) {
          result[star * nodes + column] += sample.maps[start + column] * weight;
        }
      }
    }
  }
  return result;
}

/**
 * Mean completeness of each star from contracted maps.
 *
 * @param contracted shape [star, node], as `contract` returns it
 * @param weights of the moving axis, shape [node]
 * @returns shape [star], 0..1
 */
export function weighContracted(contracted: Float64Array, weights: Float64Array): Float64Array {
  const nodes = weights.length;
  const means = new Float64Array(contracted.length / nodes);
  for (let star = 0; star < means.length; star++) {
    let sum = 0;
    for (let node = 0; node < nodes; node++) sum += contracted[star * nodes + node] * weights[node];
    means[star] = Math.min(1, Math.max(0, sum));
  }
  return means;
}

/** Sum over the stars at each node of the moving axis: a sensitivity profile [stars]. */
export function profileOf(contracted: Float64Array, nodes: number): number[] {
  const profile = new Array<number>(nodes).fill(0);
  for (let index = 0; index < contracted.length; index++) {
    profile[index % nodes] += contracted[index];
  }
  return profile;
}
