import { cutAtCandidates } from './candidate-cut';
import { correctForSmallSamples } from './small-sample';
import type { ContrastCurve, SensitivitySettings, StarInputs } from './types';

/**
 * A curve as the integral takes it: thresholds raised for few resolution elements and cut at the
 * star's candidates where the settings ask for it, in this order.
 *
 * @param curve as checkContrastCurve accepts it, not modified
 * @param star whose candidates they are
 * @param settings see SensitivitySettings
 * @throws RangeError for a size, separation or contrast outside its domain
 */
export function effectiveCurve(
  curve: ContrastCurve,
  star: StarInputs,
  settings: SensitivitySettings,
): ContrastCurve {
  const { smallSample, candidates } = settings;
  const raised = smallSample ? correctForSmallSamples(curve, smallSample.fwhmArcsec) : curve;
  if (!candidates) return raised;
  return cutAtCandidates(raised, star.candidates ?? [], candidates.halfWidthArcsec);
}
