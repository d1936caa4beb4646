/**
 * Shape of the companion distribution: m^massIndex a^semiMajorAxisIndex per d ln m d ln a on a box.
 *
 * Both indices are stored per natural logarithm; `fromLogIndex` gives the linear ones that screens
 * show. The shape says nothing about how many companions there are: that is the rate.
 */
export interface PowerLawPopulation {
  form: 'power-law';
  /** Lower edge of the box in mass [M_Jup], > 0. */
  massMinMjup: number;
  /** Upper edge of the box in mass [M_Jup], > massMinMjup. */
  massMaxMjup: number;
  /** Lower edge of the box in semi-major axis [au], > 0. */
  semiMajorAxisMinAu: number;
  /** Upper edge of the box in semi-major axis [au], > semiMajorAxisMinAu. */
  semiMajorAxisMaxAu: number;
  /** alpha: index of dN/d ln m [1]. */
  massIndex: number;
  /** beta: index of dN/d ln a [1]. */
  semiMajorAxisIndex: number;
}

/** Every form of population that the product knows; a new form joins this union and `forms.ts`. */
export type Population = PowerLawPopulation;

function checkRange(min: number, max: number, what: string, unit: string): void {
  if (!(min > 0) || !Number.isFinite(min)) {
    throw new RangeError(`${what}: the lower end must be a positive number [${unit}], got ${min}`);
  }
  if (!(max > min) || !Number.isFinite(max)) {
    throw new RangeError(
      `${what}: the upper end must exceed the lower one, got ${min} to ${max} ${unit}`,
    );
  }
}

/**
 * Refuses a population whose ranges or indices cannot be used.
 *
 * @throws RangeError for a range that is not positive and increasing, or an index that is not finite
 */
export function checkPopulation(population: Population): void {
  checkRange(population.massMinMjup, population.massMaxMjup, 'planet mass', 'M_Jup');
  checkRange(population.semiMajorAxisMinAu, population.semiMajorAxisMaxAu, 'semi-major axis', 'au');
  if (!Number.isFinite(population.massIndex)) {
    throw new RangeError(`massIndex must be a finite number, got ${population.massIndex}`);
  }
  if (!Number.isFinite(population.semiMajorAxisIndex)) {
    throw new RangeError(
      `semiMajorAxisIndex must be a finite number, got ${population.semiMajorAxisIndex}`,
    );
  }
}

/**
 * Whether a companion's best mass and semi-major axis lie in the box of a population.
 *
 * @param massMjup scalar [M_Jup]
 * @param semiMajorAxisAu scalar [au]
 * @returns true inside and on the edges: a companion exactly at a cutoff counts
 */
export function isInside(
  population: Population,
  massMjup: number,
  semiMajorAxisAu: number,
): boolean {
  return (
    massMjup >= population.massMinMjup &&
    massMjup <= population.massMaxMjup &&
    semiMajorAxisAu >= population.semiMajorAxisMinAu &&
    semiMajorAxisAu <= population.semiMajorAxisMaxAu
  );
}
