import { computeEncodedMap } from './completeness';
import { ECCENTRICITY_PRESETS } from './eccentricity';
import { DEFAULT_GRID } from './map-grid';
import type { StarInputs } from './types';

const STARS = 12;

/**
 * Maps of a few invented stars, so that a thread's tables of the usual eccentricity law stand and
 * its compiler has seen the work before the first real star comes.
 *
 * @returns number of maps made
 * Cost: 0.2 s.
 */
export function warmUpMaps(): number {
  const { law } = ECCENTRICITY_PRESETS[1];
  for (let i = 0; i < STARS; i++) {
    const star: StarInputs = {
      name: 'warm-up',
      hostMag: 6 + 0.1 * i,
      age: { medianMyr: 40, lowerMyr: 25, upperMyr: 70, minMyr: 5, maxMyr: 500 },
      distance: { distancePc: 30 + i, errorPc: 0.5 },
      curves: [
        {
          separationArcsec: Float64Array.of(0.2, 0.5, 1, 3),
          contrastMag: Float64Array.of(8, 12, 14, 14.5),
          nSigma: 5,
          band: 'H',
        },
      ],
    };
    computeEncodedMap(star, { kind: 'built-in' }, DEFAULT_GRID(), {
      eccentricity: law,
      threshold: i % 2 === 0 ? 'smooth' : 'hard',
      massOutsideTable: 'undetectable',
      ageOutsideTable: 'edge',
    });
  }
  return STARS;
}
