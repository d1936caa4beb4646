/** Every star younger or older by so many of its own sigma; between two of these a page interpolates. */
export const AGE_SHIFTS: readonly number[] = [-2, -1, 0, 1, 2];

/** The cooling model that each survey of the run uses. */
export const COOLING_AS_RUN = 'as-run';
export const COOLING_BUILT_IN = 'built-in';
