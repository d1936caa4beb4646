import {
  eccentricAnomaly,
  meanSquareEccentricity,
  separationCumulative,
  separationMoments,
  separationQuantile,
  twoPhaseDetection,
} from '@/lib/sensitivity';
import { runCheckFile } from './support/check-file';
import { eccentricityLaw } from './support/check-inputs';

const DEGREE = Math.PI / 180;

runCheckFile('orbits', {
  runners: {
    'Kepler equation': (inputs) => {
      const isDegrees = inputs.mean_anomaly_deg !== undefined;
      const mean = isDegrees ? inputs.mean_anomaly_deg * DEGREE : inputs.mean_anomaly_rad;
      const anomaly = eccentricAnomaly(mean, inputs.eccentricity);
      return isDegrees ? anomaly / DEGREE : anomaly;
    },
    'projected cdf': ({ law, x }) => {
      const at = (place: number) => separationCumulative(place, eccentricityLaw(law));
      return Array.isArray(x) ? x.map(at) : at(x);
    },
    'projected quantiles': ({ law, probabilities }) =>
      probabilities.map((p: number) => separationQuantile(p, eccentricityLaw(law))),
    'projected moments': ({ law }) => {
      const { mean, meanSquare } = separationMoments(eccentricityLaw(law));
      return {
        mean,
        mean_square: meanSquare,
        mean_e_squared: meanSquareEccentricity(eccentricityLaw(law)),
      };
    },
    'two epochs': ({ threshold_rho: threshold }) => {
      const single = 1 - separationCumulative(threshold, { law: 'circular' });
      return {
        single,
        same_position: single,
        independent_phase_same_orbit: twoPhaseDetection(threshold),
        independent_stars_formula: 1 - (1 - single) ** 2,
      };
    },
  },
});
