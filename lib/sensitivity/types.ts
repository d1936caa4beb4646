/** The nodes of a completeness map: companion mass by semi-major axis, both strictly increasing. */
export interface MapGrid {
  /** Companion masses, shape [mass], [M_Jup], > 0. */
  massMjup: Float64Array;
  /** Semi-major axes, shape [semiMajorAxis], [au], > 0. */
  semiMajorAxisAu: Float64Array;
}

/** P(detected | the star has a companion of this mass and semi-major axis). */
export interface CompletenessMap extends MapGrid {
  /** Shape [mass, semiMajorAxis], row-major, 0 to 1. */
  completeness: Float64Array;
}

/** One contrast curve: how faint a companion may be beside the star and still be found. */
export interface ContrastCurve {
  /** Angular separations, strictly increasing, [arcsec], at least 2. */
  separationArcsec: Float64Array;
  /** Faintest detectable magnitude difference at each separation, [mag]. */
  contrastMag: Float64Array;
  /** The threshold's multiple of the noise, e.g. 5. */
  nSigma: number;
  band: string;
  /** Share of position angles imaged at each separation, 0 to 1; 1 everywhere when absent. */
  coverage?: Float64Array;
}

/** Absolute magnitudes against mass and age, one array per band. */
export interface CoolingTable {
  name: string;
  massMjup: Float64Array;
  ageMyr: Float64Array;
  /** Per band, shape [mass, age], row-major, [mag]; NaN marks a missing entry. */
  magnitudes: Record<string, Float64Array>;
}

export type CoolingRelation = { kind: 'built-in' } | { kind: 'table'; table: CoolingTable };

export type EccentricityLaw =
  | { law: 'circular' }
  | { law: 'fixed'; eccentricity: number }
  | { law: 'uniform'; max: number }
  | { law: 'beta'; alpha: number; beta: number }
  | { law: 'rayleigh'; sigma: number };

/**
 * Age of a star. `lowerMyr` and `upperMyr` are the 16 % and 84 % points; `minMyr` and `maxMyr` are
 * hard bounds, and give a law uniform in log age on each side of the median when they stand alone.
 */
export interface AgeLaw {
  medianMyr: number;
  lowerMyr?: number;
  upperMyr?: number;
  minMyr?: number;
  maxMyr?: number;
}

export type DistanceLaw =
  | { distancePc: number; errorPc: number }
  | { parallaxMas: number; errorMas: number };

export interface StarInputs {
  name: string;
  /** Apparent magnitude of the star in the curve's band, [mag]. */
  hostMag: number;
  hostMassMsun?: number;
  age: AgeLaw;
  distance: DistanceLaw;
  /** One curve, or several taken close enough in time that the companion did not move. */
  curves: ContrastCurve[];
  /** Apparent magnitude per curve, where the bands differ. */
  hostMags?: number[];
  /** Extinction in the band, [mag]; default 0. */
  extinctionMag?: number;
}

export interface SensitivitySettings {
  eccentricity: EccentricityLaw;
  threshold: 'hard' | 'smooth';
  /** What a mass outside the cooling table means: never detected, or the edge value above the table. */
  massOutsideTable: 'undetectable' | 'edge';
  ageOutsideTable: 'refuse' | 'edge';
  /** Age nodes on each side of the median; default 5 under the smooth threshold, 10 under the hard. */
  ageNodesPerSide?: number;
}

/** Where a map rests on the edge of its cooling relation, or beyond it. */
export interface CoolingReport {
  /** Mass nodes that the table does not cover at one age node or more. */
  massNodesOutside: number;
  /** Age nodes moved to the nearest tabulated age. */
  ageNodesClamped: number;
  /** Mass nodes outside the built-in law's validity at one age node or more. */
  lawNodesOutsideValidity: number;
  /** Indices of the mass nodes concerned, increasing. */
  flaggedMassNodes: number[];
}
