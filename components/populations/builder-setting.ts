import { priorToText } from '@/components/runs/live-setting';
import type { RatePrior } from '@/lib/inference';
import type { AxisConvention, MassConvention } from '@/lib/population';
import { lawToQuery } from './law-address';
import type { LawDefinition } from './law-parts';

/** What indices are stated per on the screen; stored they are per natural logarithm. */
export interface Conventions {
  mass: MassConvention;
  semiMajorAxis: AxisConvention;
}

/** What the preview asks of a population, whatever its form. */
export interface PreviewSetting {
  /** Prior of the host fraction for the preview; an analysis chooses its own. */
  prior: RatePrior;
  credibleLevel: number;
  /** Host fraction for which expected detections are given [fraction]. */
  statedFraction: number;
}

/** The population itself, and what the preview asks of it. */
export interface BuilderSetting extends PreviewSetting {
  definition: LawDefinition;
  conventions: Conventions;
}

/** dN/dM ∝ M^−1.3 and dN/da ∝ a^−0.6, stored per logarithm. */
export const FIRST_DEFINITION: LawDefinition = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  massIndex: -0.3,
  semiMajorAxisIndex: 0.4,
};

export const FIRST_PREVIEW: PreviewSetting = {
  prior: { law: 'uniform', max: 1 },
  credibleLevel: 0.95,
  statedFraction: 0.05,
};

export function defaultSetting(definition: LawDefinition): BuilderSetting {
  return {
    definition,
    conventions: { mass: 'linear', semiMajorAxis: 'linear' },
    ...FIRST_PREVIEW,
  };
}

export function previewToQuery(
  setting: PreviewSetting,
  saved: PreviewSetting,
): Record<string, string> {
  const query: Record<string, string> = {};
  if (priorToText(setting.prior) !== priorToText(saved.prior)) {
    query.prior = priorToText(setting.prior);
  }
  if (setting.statedFraction !== saved.statedFraction) query.f = String(setting.statedFraction);
  return query;
}

export function builderToQuery(
  setting: BuilderSetting,
  saved: BuilderSetting,
): Record<string, string> {
  const { mass, semiMajorAxis } = setting.conventions;
  return {
    ...lawToQuery(setting.definition, saved.definition),
    ...(mass !== saved.conventions.mass && { convention: mass }),
    ...(semiMajorAxis !== mass && { axisConvention: semiMajorAxis }),
    ...previewToQuery(setting, saved),
  };
}
