export type {
  Answer,
  AnswerInputs,
  AnswerSettings,
  Detection,
  DetectionSetAside,
  PopulationView,
  SetAsideReason,
  StackedMaps,
  SummedMap,
} from './answer';
export { answerFromView, answerQuestion, countDetections, seenBy, viewPopulation } from './answer';
export type { Likelihood, RatePosterior, RatePrior, RateQuantity, RateQuestion } from './contract';
export type { ExposureContributions } from './contributions';
export { exposureContributions } from './contributions';
export type { PosteriorCurve } from './curve';
export { displayRange, posteriorCurve } from './curve';
export {
  binomialLowerLimit,
  binomialUpperLimit,
  hostFractionUpperLimit,
  poissonBinomial,
  poissonLowerLimit,
  poissonUpperLimit,
  wilsonInterval,
} from './frequentist';
export { logNoDetection } from './host-fraction';
export {
  equalTailedInterval,
  highestDensityInterval,
  isSetByPrior,
  upperLimit,
} from './intervals';
export type { LevelLimit } from './levels';
export { limitAtLowerFloor, limitsByLevel, TABLE_LEVELS } from './levels';
export {
  describePlanet,
  describePlanets,
  describePopulation,
  describeStars,
} from './population-words';
export { ratePosterior } from './posterior';
export { priorFor } from './prior-for';
export type { Condition, StatedInterval, Statement, StatementInputs } from './statement';
export {
  describeLevel,
  describeLimit,
  describePrior,
} from './statement';
