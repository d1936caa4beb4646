import {
  absoluteMagnitude,
  distanceModulus,
  distancePcFromParallax,
  fluxRatio,
} from '@/lib/quantities/magnitudes';
import { periodDays } from '@/lib/quantities/periods';
import { detectionProbability } from '@/lib/sensitivity';
import { runCheckFile } from './support/check-file';

runCheckFile('photometry', {
  runners: {
    'distance modulus': (inputs) => distanceModulus(inputs.distance_pc),
    'distance from parallax': (inputs) => distancePcFromParallax(inputs.parallax_mas),
    'contrast to absolute magnitude': (inputs) => {
      const apparent = inputs.star_magnitude + inputs.contrast_mag;
      return {
        companion_apparent: apparent,
        companion_absolute: absoluteMagnitude(apparent, inputs.distance_pc),
        flux_ratio: fluxRatio(inputs.contrast_mag),
      };
    },
    'smooth threshold': (inputs) =>
      detectionProbability(inputs.limit_mag, inputs.companion_mag, inputs.n_sigma, 'smooth'),
    period: (inputs) => periodDays(inputs.axis_au, inputs.mass_sun),
  },
});
