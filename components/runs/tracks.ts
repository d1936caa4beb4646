/** Ends of the tracks, indices in the linear convention. */
export const TRACK = {
  massIndex: [-2.5, 0.5],
  semiMajorAxisIndex: [-1.8, 0.6],
  level: [0.5, 0.99],
} as const satisfies Record<string, readonly [number, number]>;

/** Credible levels that may be typed [per cent]: a recipe takes any between 0 and 100. */
export const TYPED_LEVEL = [0.01, 99.99] as const;

/** A track reaches to the values themselves where those lie beyond its usual ends. */
export function trackOf(
  [from, to]: readonly [number, number],
  ...values: number[]
): [number, number] {
  return [Math.min(from, ...values), Math.max(to, ...values)];
}
