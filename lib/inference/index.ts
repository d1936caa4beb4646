export type { Likelihood, RatePosterior, RatePrior, RateQuantity, RateQuestion } from './contract';
