import { gaussLegendre } from '@/lib/numerics/quadrature';

/** A range of an index per natural logarithm [1]. */
export interface IndexRange {
  min: number;
  max: number;
}

/** Gauss-Legendre nodes of one index: shape [n] each, weights of a uniform prior (sum 1). */
export interface IndexNodes {
  range: IndexRange;
  at: Float64Array;
  weight: Float64Array;
}

/**
 * Nodes of an index that is uniform on a range.
 *
 * @param n number of nodes, integer 1 to 512
 * @throws RangeError for a range that is not increasing
 */
export function indexNodes(range: IndexRange, n: number): IndexNodes {
  if (!(range.min < range.max) || !Number.isFinite(range.max - range.min)) {
    throw new RangeError(`a range of indices must increase, got ${range.min} to ${range.max}`);
  }
  const { nodes, weights } = gaussLegendre(n);
  const half = 0.5 * (range.max - range.min);
  return {
    range,
    at: nodes.map((t) => range.min + half * (1 + t)),
    weight: weights.map((w) => 0.5 * w),
  };
}

/**
 * Rows that interpolate values at the nodes to other places, by the polynomial through all nodes.
 *
 * @param places inside or on the ends of the range
 * @returns shape [place, node], row-major; each row sums to 1
 * @source Berrut & Trefethen 2004, SIAM Review 46, 501; weights at Legendre nodes: Wang & Xiang
 *   2012, Math. Comp. 81, 861
 */
export function interpolationRows(nodes: IndexNodes, places: Float64Array): Float64Array {
  const n = nodes.at.length;
  const { min, max } = nodes.range;
  const barycentric = nodes.at.map((x, i) => {
    const t = (2 * (x - min)) / (max - min) - 1;
    return (i % 2 === 0 ? 1 : -1) * Math.sqrt((1 - t * t) * nodes.weight[i]);
  });
  const rows = new Float64Array(places.length * n);
  for (let p = 0; p < places.length; p++) {
    let total = 0;
    let hit = -1;
    for (let i = 0; i < n; i++) {
      const distance = places[p] - nodes.at[i];
      if (distance === 0) hit = i;
      rows[p * n + i] = barycentric[i] / distance;
      total += rows[p * n + i];
    }
    for (let i = 0; i < n; i++) {
      rows[p * n + i] = hit < 0 ? rows[p * n + i] / total : Number(i === hit);
    }
  }
  return rows;
}

/**
 * Values on a plane of nodes, interpolated to a plane of places.
 *
 * @param values shape [n, p] at the nodes
 * @param rows shape [place, n], from `interpolationRows`
 * @param columns shape [other place, p], likewise
 * @returns shape [place, other place]
 */
export function interpolatePlane(
  values: Float64Array,
  rows: Float64Array,
  columns: Float64Array,
  [n, p]: [number, number],
): Float64Array {
  const [height, width] = [rows.length / n, columns.length / p];
  const half = new Float64Array(height * p);
  for (let i = 0; i < height; i++) {
    for (let k = 0; k < n; k++) {
      const share = rows[i * n + k];
      for (let b = 0; b < p; b++) half[i * p + b] += share * values[k * p + b];
    }
  }
  const plane = new Float64Array(height * width);
  for (let i = 0; i < height; i++) {
    for (let j = 0; j < width; j++) {
      let sum = 0;
      for (let b = 0; b < p; b++) sum += half[i * p + b] * columns[j * p + b];
      plane[i * width + j] = sum;
    }
  }
  return plane;
}
