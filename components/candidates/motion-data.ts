import type { MotionEpoch, TrackPoint } from '@/components/charts/motion-track-chart';
import type { CandidateDetail } from '@/lib/schemas/candidates';
import {
  backgroundShift,
  backgroundTrack,
  covarianceOf,
  offsetOf,
} from '@/lib/sensitivity/vetting';

/** Years that the track runs on after the last epoch, as a share of all years and at least. */
const BEYOND = 0.12;
const LEAST_YEARS_BEYOND = 0.5;

/** Measured and predicted places of a candidate for the drawing; the first epoch is the reference. */
export function motionData(candidate: CandidateDetail): {
  epochs: MotionEpoch[];
  track: TrackPoint[];
} {
  const { seen, motion, hypotheses } = candidate;
  const tested = hypotheses?.observationIds ?? [];
  const reference = seen.find(({ id }) => id === tested[0]) ?? seen[0];
  if (!reference) return { epochs: [], track: [] };
  const start = offsetOf(reference);
  const epochs = seen.map((one): MotionEpoch => {
    const { separationErrorArcsec, positionAngleErrorDeg } = one;
    const errors =
      separationErrorArcsec === null || positionAngleErrorDeg === null
        ? null
        : covarianceOf({ ...one, separationErrorArcsec, positionAngleErrorDeg });
    const shift = motion && backgroundShift(motion, reference.julianYear, one.julianYear);
    const index = tested.indexOf(one.id);
    const sigmaOf = (sigmas: number[] | undefined) =>
      index < 0 || sigmas === undefined ? null : sigmas[index];
    return {
      id: one.id,
      date: one.observedOn,
      isReference: one === reference,
      ...offsetOf(one),
      errorEastArcsec: errors && Math.sqrt(errors.east),
      errorNorthArcsec: errors && Math.sqrt(errors.north),
      background: shift && {
        eastArcsec: start.eastArcsec + shift.eastArcsec,
        northArcsec: start.northArcsec + shift.northArcsec,
      },
      sigmaCommon: sigmaOf(hypotheses?.commonProperMotion.sigmas),
      sigmaBackground: sigmaOf(hypotheses?.background.sigmas),
    };
  });
  if (!motion) return { epochs, track: [] };
  const first = reference.julianYear;
  const last = Math.max(...seen.map(({ julianYear }) => julianYear));
  const until = Math.min(2049.9, last + Math.max(LEAST_YEARS_BEYOND, BEYOND * (last - first)));
  return { epochs, track: backgroundTrack(motion, start, first, until) };
}
