import { computeCompletenessMap } from '@/lib/sensitivity';
import { type Runner, runCheckFile } from './support/check-file';
import { contrastCurve, sensitivitySettings, starInputs } from './support/check-inputs';

/** Enough nodes that what is left is the integral's own error, as in the outside value. */
const MANY_AGE_NODES = 80;

const toyCompleteness: Runner = (inputs) => {
  const isExact = !inputs.uncertain_age_and_distance;
  const curve = contrastCurve(inputs.curve, inputs.star.band, inputs.n_sigma);
  const settings = sensitivitySettings(inputs.eccentricity, inputs.rule, MANY_AGE_NODES);
  const grid = {
    massMjup: Float64Array.of(inputs.mass_mjup),
    semiMajorAxisAu: Float64Array.of(inputs.axis_au),
  };
  const star = starInputs(inputs.star, [curve], isExact);
  return computeCompletenessMap(star, { kind: 'built-in' }, grid, settings).map.completeness[0];
};

runCheckFile('toy-map', {
  runners: {
    'toy circular hard': toyCompleteness,
    'toy eccentric smooth': toyCompleteness,
    'toy uncertain smooth': toyCompleteness,
  },
});
