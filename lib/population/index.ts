export type { IndexConvention } from './conventions';
export {
  AXIS_PER_PERIOD_FACTOR,
  axisIndexFromPeriodIndex,
  fromLogIndex,
  LOG10_DENSITY_FACTOR,
  toLogIndex,
} from './conventions';
export { drawCompanions } from './draws';
export type { PopulationLaws } from './forms';
export { populationDensity, populationLaws } from './forms';
export type { AxisLaw, BoundedLaw } from './law';
export type { Population, PowerLawPopulation } from './population';
export { checkPopulation, isInside } from './population';
export { powerLaw } from './power-law';
export type { PopulationWeights } from './weights';
export {
  meanCompleteness,
  meanCompletenessOfStack,
  populationWeights,
  SHARE_OUTSIDE_WARNING,
} from './weights';
