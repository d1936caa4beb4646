import type { AxisShape } from './axis-shape';

/** How the rate depends on the star: rate_j = rate (M_j/referenceMsun)^index. */
export interface HostScaling {
  /** gamma [1]. */
  index: number;
  /** M0, the host mass at which the rate is quoted [M_Sun], > 0. */
  referenceMsun: number;
}

interface AxisRange {
  /** Lower edge of the box in semi-major axis [au], > 0. */
  semiMajorAxisMinAu: number;
  /** Upper edge of the box in semi-major axis [au], > semiMajorAxisMinAu. */
  semiMajorAxisMaxAu: number;
}

interface MassRange {
  /** Lower edge of the box in mass [M_Jup], > 0. */
  massMinMjup: number;
  /** Upper edge of the box in mass [M_Jup], > massMinMjup. */
  massMaxMjup: number;
}

/** Ranges of companions: edges in mass [M_Jup] and semi-major axis [au]. */
export interface PopulationBox extends MassRange, AxisRange {}

/**
 * Shape of the companion distribution: m^massIndex a^semiMajorAxisIndex per d ln m d ln a on a box.
 *
 * Both indices are stored per natural logarithm; `fromLogIndex` gives the linear ones that screens
 * show. The shape says nothing about how many companions there are: that is the rate.
 */
export interface PowerLawPopulation extends PopulationBox {
  form: 'power-law';
  /** alpha: index of dN/d ln m [1]. */
  massIndex: number;
  /** beta: index of dN/d ln a [1]. */
  semiMajorAxisIndex: number;
  hostScaling?: HostScaling | undefined;
}

/** Any law along each axis of a box; the density is the product of the two. */
export interface ShapedPopulation extends PopulationBox {
  form: 'shaped';
  mass: AxisShape;
  semiMajorAxis: AxisShape;
  hostScaling?: HostScaling | undefined;
}

/** dN/d ln q proportional to q^massRatioIndex: the range of masses differs from star to star. */
export interface MassRatioPopulation extends AxisRange {
  form: 'mass-ratio';
  /** Lower edge in q = companion mass / host mass [1], > 0. */
  massRatioMin: number;
  /** Upper edge in q [1], > massRatioMin. */
  massRatioMax: number;
  massRatioIndex: number;
  semiMajorAxis: AxisShape;
  hostScaling?: HostScaling | undefined;
}

/**
 * A table of whole planetary systems, in columns. The question is which fraction of stars may host
 * such systems; a system without companions counts.
 */
export interface SystemsPopulation {
  form: 'systems';
  /** Shape [system], >= 0; only their ratios matter. */
  weight: number[];
  /** Shape [companion]: index of its system. */
  companionSystem: number[];
  /** Shape [companion] [M_Jup], > 0. */
  massMjup: number[];
  /** Shape [companion] [au], > 0. */
  semiMajorAxisAu: number[];
}

/** Laws along the two axes: everything but tabulated systems. */
export type LawPopulation = PowerLawPopulation | ShapedPopulation | MassRatioPopulation;

/** Every form of population that the product knows; a new form joins this union and `forms.ts`. */
export type Population = LawPopulation | SystemsPopulation;

/** Tabulated systems without their companions: counts, and the box that holds all of them. */
export interface SystemsSummary extends PopulationBox {
  form: 'systems';
  systems: number;
  companions: number;
}

/** Scaling with the host's mass, or null where every star has the same rate. */
export function hostScalingOf(population: Population | SystemsSummary): HostScaling | null {
  return population.form === 'systems' ? null : (population.hostScaling ?? null);
}

/** Whether nothing can be said about a star of unknown mass. */
export function needsHostMass(population: Population | SystemsSummary): boolean {
  return population.form === 'mass-ratio' || hostScalingOf(population) !== null;
}
