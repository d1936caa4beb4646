import type { HelpDrawing } from './drawing';
import { coverage, floor, influence, posterior, priors, stars } from './inference-drawings';
import {
  completeness,
  contrast,
  depth,
  index,
  population,
  projection,
  smallSample,
  threshold,
} from './sensitivity-drawings';

const drawings: Record<string, () => HelpDrawing> = {
  completeness,
  contrast,
  coverage,
  depth,
  floor,
  index,
  influence,
  population,
  posterior,
  priors,
  projection,
  'small-sample': smallSample,
  stars,
  threshold,
};

/**
 * The drawing of a help entry, computed by the engine's own functions.
 *
 * @throws RangeError for a name that no drawing has
 */
export function helpDrawing(name: string): HelpDrawing {
  const make = Object.hasOwn(drawings, name) ? drawings[name] : undefined;
  if (!make) throw new RangeError(`no drawing is called ${name}`);
  return make();
}
