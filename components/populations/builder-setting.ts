import {
  definitionFromQuery,
  definitionToQuery,
  isSameDefinition,
  priorFromText,
  priorToText,
  type Query,
} from '@/components/runs/live-setting';
import type { RatePrior } from '@/lib/inference';
import type { IndexConvention } from '@/lib/population';
import type { PowerLawDefinition } from '@/lib/schemas/populations';

/** The population itself, and what the preview asks of it. */
export interface BuilderSetting {
  definition: PowerLawDefinition;
  /** How the indices are quoted on the screen; stored they are per natural logarithm. */
  convention: IndexConvention;
  /** Prior of the host fraction for the preview; an analysis chooses its own. */
  prior: RatePrior;
  credibleLevel: number;
  /** Host fraction for which expected detections are given [fraction]. */
  statedFraction: number;
}

/** dN/dM ∝ M^−1.3 and dN/da ∝ a^−0.6, stored per logarithm. */
export const FIRST_DEFINITION: PowerLawDefinition = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  massIndex: -0.3,
  semiMajorAxisIndex: 0.4,
};

export function defaultSetting(definition: PowerLawDefinition): BuilderSetting {
  return {
    definition,
    convention: 'linear',
    prior: { law: 'uniform', max: 1 },
    credibleLevel: 0.95,
    statedFraction: 0.05,
  };
}

export function builderFromQuery(query: Query, saved: BuilderSetting): BuilderSetting {
  const stated = Number(query.f);
  return {
    ...saved,
    definition: definitionFromQuery(query, saved.definition),
    convention: query.convention === 'log' ? 'log' : 'linear',
    prior: priorFromText(query.prior) ?? saved.prior,
    statedFraction: stated > 0 && stated <= 1 ? stated : saved.statedFraction,
  };
}

export function builderToQuery(
  setting: BuilderSetting,
  saved: BuilderSetting,
): Record<string, string> {
  const query = definitionToQuery(setting.definition, saved.definition);
  if (setting.convention !== saved.convention) query.convention = setting.convention;
  if (priorToText(setting.prior) !== priorToText(saved.prior)) {
    query.prior = priorToText(setting.prior);
  }
  if (setting.statedFraction !== saved.statedFraction) query.f = String(setting.statedFraction);
  return query;
}

export { isSameDefinition };
