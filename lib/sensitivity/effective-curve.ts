import { cutCurveAt } from './candidate-cut';
import { correctForSmallSamples } from './small-sample';
import type { ContrastCurve, SensitivitySettings, StarInputs } from './types';

/**
 * A curve as the integral takes it: thresholds raised for few resolution elements where the settings
 * ask for it, then cut at the star's unvetted candidates.
 *
 * @param curve as checkContrastCurve accepts it, not modified
 * @param star whose candidates are cut
 * @param settings see SensitivitySettings
 * @throws RangeError for a size, separation or contrast outside its domain
 */
export function effectiveCurve(
  curve: ContrastCurve,
  star: StarInputs,
  settings: SensitivitySettings,
): ContrastCurve {
  const { smallSample } = settings;
  let effective = smallSample ? correctForSmallSamples(curve, smallSample.fwhmArcsec) : curve;
  if (!star.candidates) return effective;
  const { sources, halfWidthArcsec } = star.candidates;
  for (const source of sources) effective = cutCurveAt(effective, source, halfWidthArcsec);
  return effective;
}
