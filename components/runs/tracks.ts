/** Ends of the tracks, indices in the linear convention. */
export const TRACK = {
  massIndex: [-2.5, 0.5],
  semiMajorAxisIndex: [-1.8, 0.6],
  level: [0.5, 0.99],
} as const satisfies Record<string, readonly [number, number]>;

/** A track reaches to the values themselves where those lie beyond its usual ends. */
export function trackOf(
  [from, to]: readonly [number, number],
  ...values: number[]
): [number, number] {
  return [Math.min(from, ...values), Math.max(to, ...values)];
}
