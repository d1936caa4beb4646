export type { IndexConvention } from './conventions';
export {
  AXIS_PER_PERIOD_FACTOR,
  axisIndexFromPeriodIndex,
  fromLogIndex,
  LOG10_DENSITY_FACTOR,
  toLogIndex,
} from './conventions';
export type { AxisLaw, BoundedLaw } from './law';
export type { Population, PowerLawPopulation } from './population';
export { checkPopulation, isInside } from './population';
