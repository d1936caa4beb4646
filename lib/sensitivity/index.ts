export { ageDraw, ageNodes, ageParts, ageQuantile, type WeightedNodes } from './age';
export {
  BUILT_IN_LAW_BANDS,
  BUILT_IN_LAW_NAME,
  BUILT_IN_LAW_RANGE,
  BUILT_IN_LAW_SOURCE,
  builtInMagnitude,
  cooledBody,
  hasBuiltInBand,
  isInsideLawValidity,
  planckRadiance,
} from './built-in-law';
export { cutAtCandidates } from './candidate-cut';
export {
  type CombinationRule,
  combinationBounds,
  combineDeepest,
  combineIndependent,
} from './combine';
export { computeCompletenessMap, computeEncodedMap, ENGINE_VERSION } from './completeness';
export { checkContrastCurve, contrastAt, detectionProbability } from './contrast';
export { AgeOutsideTableError, ageRange, coolingName } from './cooling';
export { checkCoolingTable, type FainterWhenHeavier, tableLookup } from './cooling-table';
export { distanceNodes } from './distance';
export {
  ECCENTRICITY_PRESETS,
  meanSquareEccentricity,
  type NamedEccentricityLaw,
  requireEccentricityLaw,
} from './eccentricity';
export { decodeMap, encodeMap } from './encoding';
export { ageUnder } from './field-age';
export { eccentricAnomaly, trueAnomaly } from './kepler';
export { type CompletenessFall, checkCompletenessMap } from './map-checks';
export { DEFAULT_GRID, requireGrid } from './map-grid';
export {
  separationCumulative,
  separationMoments,
  separationQuantile,
  twoPhaseDetection,
} from './orbits';
export { type CellMap, regridCells, regridNodes } from './regrid';
export { simulateCompleteness } from './simulate';
export { correctForSmallSamples, smallSampleThreshold } from './small-sample';
export type {
  AgeLaw,
  AgeOfStar,
  CompletenessMap,
  ContrastCurve,
  CoolingRelation,
  CoolingReport,
  CoolingTable,
  DistanceLaw,
  EccentricityLaw,
  MapGrid,
  SensitivitySettings,
  StarInputs,
  StellarCompanion,
  UnvettedCandidate,
} from './types';
export { unstableZone } from './unstable-zone';
export { type StarChange, varyStar } from './vary';
export { warmUpMaps } from './warm-up';
