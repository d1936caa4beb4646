/** Which stars carry the exposure. */
export interface ExposureContributions {
  /** Stars by falling completeness (ties by index), shape [star]. */
  order: Int32Array;
  /** Share of the exposure of each star, in the order of the input, shape [star] [fraction]. */
  share: Float64Array;
  /** The smallest number of stars that together carry half of the exposure. */
  starsForHalf: number;
}

/**
 * How the exposure S spreads over the stars.
 *
 * @param completeness mean completeness of each star, shape [star], 0..1
 * Edges: where no star shows anything all shares are 0 and starsForHalf is 0.
 * @example exposureContributions(Float64Array.of(0.1, 0.7, 0.2)).starsForHalf // 1
 */
export function exposureContributions(completeness: Float64Array): ExposureContributions {
  const order = Int32Array.from(completeness.keys()).sort(
    (a, b) => completeness[b] - completeness[a] || a - b,
  );
  let exposure = 0;
  for (const star of order) exposure += completeness[star];
  const share = completeness.map((c) => (exposure > 0 ? c / exposure : 0));
  let starsForHalf = 0;
  let carried = 0;
  while (exposure > 0 && carried < 0.5 * exposure) {
    carried += completeness[order[starsForHalf]];
    starsForHalf++;
  }
  return { order, share, starsForHalf };
}
