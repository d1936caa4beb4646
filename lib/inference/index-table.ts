import { type PopulationBox, type PowerLawPopulation, populationWeights } from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';
import type { StackedMaps, SummedMap } from './answer';
import { contractStack } from './contraction';
import { type IndexNodes, type IndexRange, indexNodes, interpolationRows } from './index-nodes';

/** Ranges on which the two indices of a power law are uniform, per natural logarithm. */
export interface IndexRanges {
  massIndex: IndexRange;
  semiMajorAxisIndex: IndexRange;
}

/** Mean completeness of every star at nodes of both indices. */
export interface IndexTable {
  ranges: PopulationBox;
  massIndex: IndexNodes;
  semiMajorAxisIndex: IndexNodes;
  stars: number;
  /** Shape [mass index, axis index, star], 0..1; null where only the summed map was given. */
  completeness: Float64Array | null;
  /** S, shape [mass index, axis index] [stars]. */
  exposure: Float64Array;
  /** Share of the population outside the maps, shape [mass index, axis index] [fraction]. */
  shareOutsideMap: Float64Array;
}

/** Nodes a side where nothing else is asked for. */
export const INDEX_NODES = 12;

function populationAt(
  ranges: PopulationBox,
  massIndex: number,
  semiMajorAxisIndex: number,
): PowerLawPopulation {
  const { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu } = ranges;
  return {
    form: 'power-law',
    massMinMjup,
    massMaxMjup,
    semiMajorAxisMinAu,
    semiMajorAxisMaxAu,
    massIndex,
    semiMajorAxisIndex,
  };
}

/**
 * Mean completeness of every star at Gauss-Legendre nodes of the two indices of a power law.
 *
 * @param maps stacked per star, or summed, which serves the mean number only
 * @param ranges of the population in mass and semi-major axis
 * @param indices ranges of the two indices, per natural logarithm
 * @param n nodes a side, default 12
 * @throws RangeError for ranges that cannot be used or lie outside the maps, and for maps that do
 *   not fit the grid
 * Cost: `contractStack` with n sets of weights on each axis.
 */
export function indexTable(
  maps: StackedMaps | SummedMap,
  grid: MapGrid,
  ranges: PopulationBox,
  indices: IndexRanges,
  n = INDEX_NODES,
): IndexTable {
  const massIndex = indexNodes(indices.massIndex, n);
  const semiMajorAxisIndex = indexNodes(indices.semiMajorAxisIndex, n);
  const weights = Array.from(massIndex.at, (alpha, i) =>
    populationWeights(grid, populationAt(ranges, alpha, semiMajorAxisIndex.at[i])),
  );
  const massWeights = weights.map(({ mass }) => mass);
  const axisWeights = weights.map(({ semiMajorAxis }) => semiMajorAxis);
  const total = (weight: Float64Array) => weight.reduce((sum, one) => sum + one, 0);
  const shareOutsideMap = new Float64Array(n * n).map((_, node) =>
    Math.max(0, 1 - total(massWeights[Math.floor(node / n)]) * total(axisWeights[node % n])),
  );
  const shared = { ranges, massIndex, semiMajorAxisIndex, shareOutsideMap };
  if ('summed' in maps) {
    const exposure = contractStack(maps.summed, grid, massWeights, axisWeights);
    if (exposure.length !== n * n) throw new RangeError('the summed map does not fit the grid');
    return { ...shared, stars: maps.stars, completeness: null, exposure };
  }
  const completeness = contractStack(maps, grid, massWeights, axisWeights);
  const stars = completeness.length / (n * n);
  const exposure = new Float64Array(n * n);
  for (let node = 0; node < n * n; node++) {
    for (let at = node * stars; at < (node + 1) * stars; at++) {
      completeness[at] = Math.min(1, Math.max(0, completeness[at]));
      exposure[node] += completeness[at];
    }
  }
  return { ...shared, stars, completeness, exposure };
}

/**
 * Mean completeness of every star at any pair of indices, for controls that move both.
 *
 * @param massIndex alpha, inside its range
 * @param semiMajorAxisIndex beta, inside its range
 * @returns shape [star], 0..1
 * @throws RangeError for an index outside its range, and for a table of a summed map
 * Accuracy: 3e-4 with 12 nodes on ranges 3 wide, corners included; 2e-5 with 16.
 * Cost: one multiply-add a node and star.
 */
export function completenessAtIndices(
  table: IndexTable,
  massIndex: number,
  semiMajorAxisIndex: number,
): Float64Array {
  const { completeness, stars } = table;
  if (completeness === null) throw new RangeError('the table of a summed map holds no stars');
  const rowOf = (nodes: IndexNodes, index: number) => {
    const { min, max } = nodes.range;
    if (!(index >= min && index <= max)) {
      throw new RangeError(`the table holds indices from ${min} to ${max}, not ${index}`);
    }
    return interpolationRows(nodes, Float64Array.of(index));
  };
  const inMass = rowOf(table.massIndex, massIndex);
  const inAxis = rowOf(table.semiMajorAxisIndex, semiMajorAxisIndex);
  const means = new Float64Array(stars);
  for (let i = 0; i < inMass.length; i++) {
    for (let j = 0; j < inAxis.length; j++) {
      const share = inMass[i] * inAxis[j];
      const start = (i * inAxis.length + j) * stars;
      for (let star = 0; star < stars; star++) means[star] += share * completeness[start + star];
    }
  }
  return means.map((c) => Math.min(1, Math.max(0, c)));
}
