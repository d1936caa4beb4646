export type { Likelihood, RatePosterior, RatePrior, RateQuantity, RateQuestion } from './contract';
export { logNoDetection } from './host-fraction';
export {
  equalTailedInterval,
  highestDensityInterval,
  isSetByPrior,
  upperLimit,
} from './intervals';
export { ratePosterior } from './posterior';
