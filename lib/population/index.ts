export type {
  AxisShape,
  BrokenPowerLawShape,
  LogNormalShape,
  PowerLawShape,
  TabulatedShape,
} from './axis-shape';
export { axisLaw, indicesOf, mapIndices } from './axis-shape';
export { isInside, populationBox, sampleBox, summariseSystems } from './box';
export { brokenPowerLaw } from './broken-power-law';
export { checkPopulation, populationWarnings } from './checks';
export type { AxisConvention, IndexConvention, MassConvention } from './conventions';
export {
  AXIS_PER_PERIOD_FACTOR,
  axisIndexFromPeriodIndex,
  fromLogIndex,
  LOG10_DENSITY_FACTOR,
  toLogIndex,
} from './conventions';
export type { StatedConventions } from './convert';
export { toStoredPopulation } from './convert';
export type { DrawnCompanions, DrawnSystems } from './draws';
export { drawCompanions, drawSystems } from './draws';
export type { PopulationLaws } from './forms';
export { axisShapes, populationDensity, populationLaws } from './forms';
export {
  largestReferenceFraction,
  massOfRatioMjup,
  rateScales,
  requireHostMasses,
  starsWithoutMass,
} from './host-mass';
export type { AxisLaw, BoundedLaw } from './law';
export { logNormal } from './log-normal';
export { marginalWeights } from './marginals';
export type {
  HostScaling,
  LawPopulation,
  MassRatioPopulation,
  Population,
  PopulationBox,
  PowerLawPopulation,
  ShapedPopulation,
  SystemsPopulation,
  SystemsSummary,
} from './population';
export { hostScalingOf, needsHostMass } from './population';
export { powerLaw } from './power-law';
export type { SampleCompleteness } from './sample-completeness';
export { sampleCompleteness } from './sample-completeness';
export type { SystemsOnGrid, SystemsSeen } from './systems';
export { seeSystems, systemsOnGrid } from './systems';
export { tabulatedLaw } from './tabulated';
export { sumAlong, sumOfIntegers } from './weighted-sums';
export type { MovingAxis, PopulationWeights } from './weights';
export {
  meanCompleteness,
  meanCompletenessOfStack,
  populationWeights,
  SHARE_OUTSIDE_WARNING,
  weightsWhileMoving,
} from './weights';
