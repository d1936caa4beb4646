import { gaussHermite } from '@/lib/numerics/quadrature';
import { distancePcFromParallax } from '@/lib/quantities/magnitudes';
import type { WeightedNodes } from './age';
import type { DistanceLaw } from './types';

const NODES = 3;

/**
 * Distance of a star at a normal deviate z: d0 + σ z, or 1000/(p + σ z).
 *
 * @param law distance or parallax with its error
 * @returns function of z to [pc]
 * @throws RangeError for a value not > 0 or an error < 0; the returned function throws where a
 *   deviate takes distance or parallax to 0 or below
 */
export function distanceAt(law: DistanceLaw): (z: number) => number {
  const [name, value, error] =
    'distancePc' in law
      ? (['distancePc', law.distancePc, law.errorPc] as const)
      : (['parallaxMas', law.parallaxMas, law.errorMas] as const);
  if (!(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`${name} must be finite and > 0, got ${value}`);
  }
  if (!(error >= 0 && Number.isFinite(error))) {
    throw new RangeError(`the error of ${name} must be finite and >= 0, got ${error}`);
  }
  return (z) => {
    const moved = value + error * z;
    if (!(moved > 0)) {
      throw new RangeError(`${name} must stay > 0 at every node, got ${moved} at ${z} sigma`);
    }
    return name === 'distancePc' ? moved : distancePcFromParallax(moved);
  };
}

/**
 * Distance nodes of a star: 3 Gauss–Hermite nodes, exact to fifth order in z.
 *
 * @param law distance or parallax with its error
 * @returns distances [pc], weights that sum to 1; one node without an error
 * @throws RangeError for a value not > 0, an error < 0, or an error so large that a node is not > 0
 */
export function distanceNodes(law: DistanceLaw): WeightedNodes {
  const distance = distanceAt(law);
  const error = 'distancePc' in law ? law.errorPc : law.errorMas;
  const { nodes, weights } = gaussHermite(error === 0 ? 1 : NODES);
  return { values: nodes.map(distance), weights };
}
