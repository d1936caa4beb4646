/**
 * The inner loops of a completeness map, on one block of memory: places in it are counted in
 * doubles. Two sets exist, compiled and plain; both add in the same order.
 */
export interface Kernels {
  name: 'compiled' | 'plain';
  /** Memory of at least so many doubles; what it held stays, older views of it end. */
  reserve(doubles: number): Float64Array;
  /**
   * memory[target + i] += v and memory[source + i] -= v for i < count, with v = perDrop · D[i] +
   * perF · F[i] + perG · G[i] and D, F, G the slices at `slice` and one and two `plane` further.
   * `count` is even.
   */
  addRow(
    target: number,
    source: number,
    slice: number,
    plane: number,
    perDrop: number,
    perF: number,
    perG: number,
    count: number,
  ): void;
  /** The same with perG2 times the slice three planes further. */
  addLongRow(
    target: number,
    source: number,
    slice: number,
    plane: number,
    perDrop: number,
    perF: number,
    perG: number,
    perG2: number,
    count: number,
  ): void;
  /** memory[out + i + k] += weights[i] · taps[k] for i < count, k < tapCount, which is even. */
  convolve(out: number, weights: number, count: number, taps: number, tapCount: number): void;
  /**
   * Two masses at once: out[i] = w[0] · rows[0][i] + Σ w[c] · rows[c][i] over first <= c < end, for
   * i < count; `stride` is the distance of rows. `count` is a multiple of 8, first >= 1.
   */
  multiplyPair(
    out: number,
    outNext: number,
    weights: number,
    weightsNext: number,
    rows: number,
    stride: number,
    first: number,
    end: number,
    count: number,
  ): void;
}
