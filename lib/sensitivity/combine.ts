import { unionAxis } from '@/lib/numerics/grid';
import { regridNodes } from './regrid';
import type { CompletenessMap, MapGrid } from './types';

/** How the maps of one star become one map. */
export type CombinationRule = 'deepest' | 'independent';

/**
 * Largest completeness at each point: a lower bound whatever the epochs have to do with each other.
 *
 * @param maps at least one, not modified; brought to the union of their nodes, 0 outside each
 * @throws RangeError for no map or a broken one
 * @example completeness 0.3 and 0.6 give 0.6
 */
export function combineDeepest(maps: CompletenessMap[]): CompletenessMap {
  return combine(maps, (values) => values.reduce((a, b) => Math.max(a, b), 0));
}

/**
 * 1 - Π (1 - C): the companion's places at the epochs taken as unrelated.
 *
 * Optimistic for repeated similar observations, because the orbit's plane is shared: for circular
 * orbits seen beyond ρ = 0.8 two epochs give 0.790, this formula 0.840.
 *
 * @param maps at least one, not modified; brought to the union of their nodes, 0 outside each
 * @throws RangeError for no map or a broken one
 * @example completeness 0.3 and 0.3 give 0.51
 */
export function combineIndependent(maps: CompletenessMap[]): CompletenessMap {
  return combine(maps, (values) => 1 - values.reduce((missed, c) => missed * (1 - c), 1));
}

/**
 * Bounds that hold whatever the correlation: max C <= C <= min(1, Σ C) (Fréchet).
 *
 * @param maps at least one, not modified
 * @throws RangeError for no map or a broken one
 */
export function combinationBounds(maps: CompletenessMap[]): {
  lower: CompletenessMap;
  upper: CompletenessMap;
} {
  return {
    lower: combineDeepest(maps),
    upper: combine(maps, (values) => values.reduce((sum, c) => sum + c, 0)),
  };
}

function combine(maps: CompletenessMap[], rule: (values: number[]) => number): CompletenessMap {
  if (maps.length === 0) throw new RangeError('maps must hold at least one map, got none');
  const grid: MapGrid = {
    massMjup: unionAxis(maps.map((map) => map.massMjup)),
    semiMajorAxisAu: unionAxis(maps.map((map) => map.semiMajorAxisAu)),
  };
  const brought = maps.map((map) => regridNodes(map, grid).map.completeness);
  const completeness = brought[0].map((_, cell) => {
    const value = rule(brought.map((values) => values[cell]));
    return Math.min(1, Math.max(0, value));
  });
  return { ...grid, completeness };
}
