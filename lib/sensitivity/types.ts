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

/**
 * Age of a star: one law, or several of which one is true, each with its probability (a member of a
 * young group, else a star of the field). The probabilities sum to 1.
 */
export type AgeOfStar = AgeLaw | { mixture: { probability: number; age: AgeLaw }[] };

export type DistanceLaw =
  | { distancePc: number; errorPc: number }
  | { parallaxMas: number; errorMas: number };

/** The orbit of a star that is known to accompany the listed one. */
export interface StellarCompanion {
  /** Semi-major axis of the pair, [au], > 0. */
  semiMajorAxisAu: number;
  /** 0 <= e < 1. */
  eccentricity: number;
  /** Mass of the companion over that of the listed star, 0 < q <= 1. */
  massRatio: number;
}

/** A source beside the star of which nobody knows whether it is bound. */
export interface UnvettedCandidate {
  /** [arcsec], > 0. */
  separationArcsec: number;
  /** How much fainter than the star it is, [mag]; absent when nobody measured it. */
  contrastMag?: number;
  /** Band of the contrast; absent when it holds for every curve of the star. */
  band?: string;
}

export interface StarInputs {
  name: string;
  /** Apparent magnitude of the star in the curve's band, [mag]. */
  hostMag: number;
  hostMassMsun?: number;
  age: AgeOfStar;
  distance: DistanceLaw;
  /** One curve, or several taken close enough in time that the companion did not move. */
  curves: ContrastCurve[];
  /** Apparent magnitude per curve, where the bands differ. */
  hostMags?: number[];
  /** Extinction in the band, [mag]; default 0. */
  extinctionMag?: number;
  /** Probability that the age, that of a group, is the star's; used where a field age is set. */
  membershipProbability?: number;
  /** Used where the settings remove the unstable zone. */
  stellarCompanion?: StellarCompanion;
  /** Used where the settings cut the curves at candidates. */
  candidates?: UnvettedCandidate[];
}

export interface SensitivitySettings {
  eccentricity: EccentricityLaw;
  threshold: 'hard' | 'smooth';
  /** What a mass outside the cooling table means: never detected, or the edge value above the table. */
  massOutsideTable: 'undetectable' | 'edge';
  ageOutsideTable: 'refuse' | 'edge';
  /**
   * Asks for so many age nodes on each side of the median. Absent, one curve is integrated exactly
   * in age; several curves of one star take 5 (smooth) or 10 (hard).
   */
  ageNodesPerSide?: number;
  /** Raises the thresholds close to the star, see correctForSmallSamples; absent: as given. */
  smallSample?: { fwhmArcsec: number };
  /** Takes out axes on which a stellar companion lets nothing stay, see unstableZone; absent: kept. */
  unstableZone?: 'remove';
  /** Cuts the curves at the star's candidates, see cutAtCandidates; absent: they change nothing. */
  candidates?: { halfWidthArcsec: number };
  /** Age of a star that does not belong to its group, uniform in log age; absent: all belong. */
  fieldAge?: { minMyr: number; maxMyr: number };
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
  /** Nodes set to 0 because a stellar companion lets nothing stay there; absent when none is known. */
  nodesRemovedByStellarCompanion?: number;
}
