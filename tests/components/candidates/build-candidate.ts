import type { CandidateDetail, FitView, ObservationView } from '@/lib/schemas/candidates';

export const fitOf = (chiSquared: number, probability: number, last = 1): FitView => ({
  ...{ chiSquared, probability },
  degreesOfFreedom: 2,
  sigmas: [0, last],
});

const epoch = (id: string, observedOn: string, julianYear: number): ObservationView => ({
  ...{ id, observedOn, julianYear },
  separationArcsec: 0.842,
  separationErrorArcsec: 0.004,
  positionAngleDeg: 37.3,
  positionAngleErrorDeg: 0.3,
  band: 'H',
  contrastMag: 11,
  contrastErrorMag: 0.1,
  source: null,
  isFromFile: true,
  by: 'R. Castellan',
});

/** An invented candidate that keeps its place beside a moving star. */
export function buildCandidate(given: Partial<CandidateDetail> = {}): CandidateDetail {
  return {
    id: '00000000-0000-4000-8000-000000000001',
    name: 'cc1',
    star: 'Host',
    survey: { slug: 'halyard', name: 'HALYARD', position: 0 },
    status: 'candidate',
    probability: 0.35,
    massMjup: 8.2,
    massErrorsMjup: [2.2, 2.9],
    semiMajorAxisAu: 165,
    semiMajorAxisErrorsAu: [30, 40],
    observations: 2,
    isInsideRanges: true,
    isOpen: true,
    proposals: 0,
    target: { id: '00000000-0000-4000-8000-000000000002', distancePc: 46.5, ageMyr: 24 },
    reference: null,
    history: [],
    seen: [epoch('a', '2015-08-15', 2015.62), epoch('b', '2019-04-20', 2019.3)],
    motion: {
      raDeg: 309.35,
      decDeg: -8.3,
      pmRaMasYr: 85.2,
      pmDecMasYr: -61.7,
      parallaxMas: 21.5,
      parallaxErrorMas: 0.05,
    },
    motionMissing: null,
    hypotheses: {
      observationIds: ['a', 'b'],
      commonProperMotion: fitOf(0.64, 0.73, 0.8),
      background: fitOf(2916, 0, 54),
    },
    mass: null,
    massMissing: 'No epoch has a contrast with its band',
    axis: null,
    axisMissing: 'There is no epoch yet',
    can: { vet: true, propose: true },
    ...given,
  };
}
