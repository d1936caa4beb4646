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
export {
  answerFromView,
  answerQuestion,
  countDetections,
  seenBy,
  viewOfStars,
  viewPopulation,
} from './answer';
export { backgroundUpperLimit } from './background';
export type { FrequentistCompanions, FrequentistRow } from './beside';
export { frequentistBeside } from './beside';
export type { CalibrationPart, CalibrationSetup } from './calibration';
export { calibrationPart, RANK_DRAWS } from './calibration';
export type { Calibration, Coverage } from './calibration-verdict';
export { isAsPredicted, kolmogorovP, mergeCalibration } from './calibration-verdict';
export type {
  CandidateTreatment,
  Likelihood,
  RatePosterior,
  RatePrior,
  RateQuantity,
  RateQuestion,
  UndecidedCandidate,
} from './contract';
export { MOST_CANDIDATES } from './contract';
export type { ContractedMaps } from './contraction';
export { completenessWhileMoving, contractStack, contractStillAxis } from './contraction';
export type { ExposureContributions } from './contributions';
export { exposureContributions } from './contributions';
export type { PosteriorCurve } from './curve';
export { displayRange, posteriorCurve } from './curve';
export { detectionShape, logDetectionShapes } from './detection-shape';
export type { BayesFactorWords, EvidenceSettings, PopulationEvidence } from './evidence';
export { bayesFactorWords, populationEvidence } from './evidence';
export type { CoverageAtRate, ExactCoverage } from './exact-coverage';
export { coverageAtRates, exactCoverage } from './exact-coverage';
export { feldmanCousinsInterval } from './feldman-cousins';
export type { Forecast, LimitByStars, StarGain } from './forecast';
export {
  addSample,
  forecastSurvey,
  limitByStars,
  starGains,
  starsLikeThese,
} from './forecast';
export type { FreeIndexPosterior, FreeIndexQuestion } from './free-indices';
export { freeIndexPosterior } from './free-indices';
export {
  binomialLowerLimit,
  binomialUpperLimit,
  hostFractionLowerLimit,
  hostFractionUpperLimit,
  poissonBinomial,
  poissonLowerLimit,
  poissonUpperLimit,
  wilsonInterval,
} from './frequentist';
export type { IndexNodes, IndexRange } from './index-nodes';
export type {
  ConditionalLimit,
  IndexSummary,
  JointDensity,
  ParameterSummary,
} from './index-summaries';
export { limitByIndex, summariseIndices } from './index-summaries';
export type { IndexRanges, IndexTable } from './index-table';
export { completenessAtIndices, INDEX_NODES, indexTable } from './index-table';
export type { Rest, StarInfluence, SurveyRest, Without } from './influence';
export {
  groupInfluence,
  restInfluence,
  STAR_WARNING,
  starInfluence,
  surveyInfluence,
} from './influence';
export {
  equalTailedInterval,
  highestDensityInterval,
  isSetByPrior,
  upperLimit,
} from './intervals';
export type { LevelLimit } from './levels';
export { limitAtLowerFloor, limitsByLevel, TABLE_LEVELS } from './levels';
export type { LimitMap, LimitMapQuestion } from './limit-map';
export { limitMap, sumMaps } from './limit-map';
export type { CompanionMeasurement, Measured, MeasuredDetection } from './measured-places';
export { logNoDetection } from './no-detection';
export type {
  CountedCandidate,
  OpenCandidate,
  OpenCandidates,
  StatedCandidates,
} from './open-candidates';
export {
  candidateTreatment,
  countCandidates,
  countsAnything,
  describeBackground,
  describeCandidates,
  setAside,
} from './open-candidates';
export type { OverlapBracket } from './overlap-bracket';
export { overlapBracket } from './overlap-bracket';
export type { ComparedPopulation, PopulationComparison } from './population-comparison';
export { comparePopulations } from './population-comparison';
export type { PairAnswers, PairQuestion } from './population-pairs';
export type { DescribedPopulation } from './population-words';
export {
  describePlanet,
  describePlanets,
  describePopulation,
  describeStars,
} from './population-words';
export { ratePosterior } from './posterior';
export type { CountDistribution, Sample } from './prediction';
export {
  countInterval,
  countQuantile,
  countsAtRate,
  negativeBinomial,
  predictCounts,
} from './prediction';
export type { AskedColumns } from './prior-for';
export { otherLikelihood, priorFor, sayMissingColumn, whyNoColumn } from './prior-for';
export type { LimitingEnd, SettledIndices } from './settled-indices';
export { freeIndices } from './settled-indices';
export { withoutStars } from './star-selection';
export type { WantedLimit } from './stars-needed';
export { MOST_STARS, starsNeeded } from './stars-needed';
export type { Condition, StatedInterval, Statement, StatementInputs } from './statement';
export {
  describeLevel,
  describeLimit,
  describePrior,
} from './statement';
export type { IndexPlane, Sweep, SweepParameter } from './sweep';
export { sweepIndices, sweepLimits, withParameter } from './sweep';
export type { SweptParameter } from './sweep-words';
export {
  describeSweepValue,
  parameterWithUnit,
  quotedSweepValue,
  sweptParameters,
} from './sweep-words';
export type { DensityTable } from './tabulated-prior';
export { densityAt, tabulatePosterior } from './tabulated-prior';
export type { TailLimits } from './tail-limits';
export { tailLimits } from './tail-limits';
