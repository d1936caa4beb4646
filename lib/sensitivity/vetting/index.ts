export { axisFromSeparation, type Estimate } from './axis-from-separation';
export {
  backgroundShift,
  backgroundTrack,
  type HostMotion,
  parallaxFactors,
} from './background-track';
export { type HypothesisFit, type MotionHypothesis, testMotion } from './motion-test';
export {
  covarianceOf,
  type MeasuredOffset,
  type Offset,
  offsetOf,
  type PolarOffset,
  polarOf,
} from './offsets';
export {
  LEAST_MAGNITUDE_ERROR,
  massFromPhotometry,
  type PhotometricMass,
  type Photometry,
} from './photometric-mass';
