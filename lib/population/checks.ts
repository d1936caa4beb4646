import { type AxisShape, axisLaw, indicesOf } from './axis-shape';
import {
  hostScalingOf,
  type LawPopulation,
  type Population,
  type SystemsPopulation,
} from './population';

function checkRange(min: number, max: number, what: string, unit: string): void {
  const inUnit = unit === '' ? '' : ` [${unit}]`;
  if (!(min > 0) || !Number.isFinite(min)) {
    throw new RangeError(`${what}: the lower end must be a positive number${inUnit}, got ${min}`);
  }
  if (!(max > min) || !Number.isFinite(max)) {
    const range = `${min} to ${max} ${unit}`.trim();
    throw new RangeError(`${what}: the upper end must exceed the lower one, got ${range}`);
  }
}

function checkIndex(index: number, what: string): void {
  if (!Number.isFinite(index))
    throw new RangeError(`${what} must be a finite number, got ${index}`);
}

function checkShape(shape: AxisShape, min: number, max: number, what: string): void {
  for (const { field, index } of indicesOf(shape)) checkIndex(index, `${what}: ${field}`);
  const law = axisLaw(shape);
  const inside = law.integral(min, max);
  if (!(inside > 0) || !Number.isFinite(inside)) {
    throw new RangeError(
      `${what}: the ${shape.shape} law has nothing between ${min} and ${max}; move it or the range`,
    );
  }
}

function checkLaws(population: LawPopulation): void {
  const { semiMajorAxisMinAu: near, semiMajorAxisMaxAu: far } = population;
  if (population.form === 'mass-ratio') {
    checkRange(population.massRatioMin, population.massRatioMax, 'mass ratio', '');
    checkIndex(population.massRatioIndex, 'massRatioIndex');
  } else {
    checkRange(population.massMinMjup, population.massMaxMjup, 'planet mass', 'M_Jup');
  }
  checkRange(near, far, 'semi-major axis', 'au');
  if (population.form === 'power-law') {
    checkIndex(population.massIndex, 'massIndex');
    checkIndex(population.semiMajorAxisIndex, 'semiMajorAxisIndex');
    return;
  }
  checkShape(population.semiMajorAxis, near, far, 'semi-major axis');
  if (population.form === 'shaped') {
    checkShape(population.mass, population.massMinMjup, population.massMaxMjup, 'planet mass');
  }
}

function checkSystems(population: SystemsPopulation): void {
  const { weight, companionSystem, massMjup, semiMajorAxisAu } = population;
  if (weight.length === 0) throw new RangeError('the list of systems is empty');
  const bad = weight.findIndex((w) => !(w >= 0) || !Number.isFinite(w));
  if (bad >= 0)
    throw new RangeError(`the weight of system ${bad + 1} is ${weight[bad]}, not 0 or more`);
  if (!weight.some((w) => w > 0)) throw new RangeError('every system has the weight 0');
  const companions = companionSystem.length;
  if (massMjup.length !== companions || semiMajorAxisAu.length !== companions) {
    throw new RangeError(
      `${companions} companions name a system, ${massMjup.length} a mass and ` +
        `${semiMajorAxisAu.length} a semi-major axis`,
    );
  }
  let held = 0;
  for (let k = 0; k < companions; k++) {
    const system = companionSystem[k];
    if (!Number.isInteger(system) || !(system >= 0 && system < weight.length)) {
      throw new RangeError(
        `companion ${k + 1} names system ${system}, which the list does not hold`,
      );
    }
    for (const [value, what] of [
      [massMjup[k], 'mass'],
      [semiMajorAxisAu[k], 'semi-major axis'],
    ] as const) {
      if (!(value > 0) || !Number.isFinite(value)) {
        throw new RangeError(`the ${what} of companion ${k + 1} must be positive, got ${value}`);
      }
    }
    held += weight[system];
  }
  if (!(held > 0)) {
    throw new RangeError(
      'no system of weight above 0 has a companion: there is nothing to look for',
    );
  }
}

/**
 * Refuses a population whose ranges, laws or systems cannot be used.
 *
 * @throws RangeError for a range that is not positive and increasing, an index that is not finite, a
 *   law with nothing inside its range, a width that is not positive, an empty list of systems, a
 *   negative weight, a companion without a positive mass and semi-major axis
 */
export function checkPopulation(population: Population): void {
  if (population.form === 'systems') {
    checkSystems(population);
    return;
  }
  checkLaws(population);
  const scaling = hostScalingOf(population);
  if (scaling === null) return;
  checkIndex(scaling.index, 'host scaling: index');
  if (!(scaling.referenceMsun > 0) || !Number.isFinite(scaling.referenceMsun)) {
    throw new RangeError(
      `host scaling: the reference mass must be a positive number [M_Sun], got ${scaling.referenceMsun}`,
    );
  }
}

function breakOutside(shape: AxisShape, min: number, max: number, what: string): string[] {
  if (shape.shape !== 'broken-power-law') return [];
  if (shape.breakAt > min && shape.breakAt < max) return [];
  return [
    `the break in ${what} at ${shape.breakAt} lies outside the range, which holds a single power law`,
  ];
}

/** What a population allows and a person should know, in words. */
export function populationWarnings(population: Population): string[] {
  if (population.form === 'power-law' || population.form === 'systems') return [];
  const { semiMajorAxisMinAu: near, semiMajorAxisMaxAu: far } = population;
  return [
    ...(population.form === 'shaped'
      ? breakOutside(population.mass, population.massMinMjup, population.massMaxMjup, 'mass')
      : []),
    ...breakOutside(population.semiMajorAxis, near, far, 'semi-major axis'),
  ];
}
