import { fitLikelihood } from '@/components/analyses/prior-choice';
import type { RatePrior, RateQuantity } from '@/lib/inference';
import { fromLogIndex } from '@/lib/population';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import { COOLING_AS_RUN } from '@/lib/schemas/stack-choices';
import type { Under } from './under';

/** Everything that follows a control at once, without a run. */
export interface LiveSetting {
  definition: PowerLawDefinition;
  credibleLevel: number;
  detections: AnalysisRecipe['detections'];
  likelihood: AnalysisRecipe['likelihood'];
  prior: RatePrior;
  /** Left out: candidates without an answer are set aside. */
  candidates?: AnalysisRecipe['candidates'];
  /** Expected number of false detections among those counted; mean number only. */
  background?: number;
  /** Every star moved by so many sigma of its own age; left out: none. */
  ageShift?: number;
  /** Another cooling model than the run's. */
  cooling?: string;
}

export function quantityOf(likelihood: LiveSetting['likelihood']): RateQuantity {
  return likelihood === 'host-fraction' ? 'host_fraction' : 'companions_per_star';
}

export type Query = Record<string, string | undefined>;

export function settingOfRecipe(
  recipe: AnalysisRecipe,
  definition: PowerLawDefinition,
): LiveSetting {
  const { credibleLevel, detections, likelihood, prior, candidates, background } = recipe;
  return {
    ...{ definition, credibleLevel, detections, likelihood, prior },
    ...(candidates && { candidates }),
    ...(background !== undefined && { background }),
  };
}

/** The setting with another quantity: prior and background that it does not allow are left. */
export function withLikelihood(
  setting: LiveSetting,
  likelihood: LiveSetting['likelihood'],
  saved: LiveSetting,
): LiveSetting {
  const { background: _left, ...kept } = setting;
  const background = setting.background ?? saved.background;
  const prior =
    saved.likelihood === likelihood && saved.prior.law === 'tabulated'
      ? saved.prior
      : fitLikelihood(setting.prior, setting.likelihood, likelihood);
  return {
    ...kept,
    likelihood,
    prior,
    ...(likelihood === 'mean-number' && background !== undefined && { background }),
  };
}

/** Ages and cooling as they are named: what equals the run's own is left out. */
export function withInputs(setting: LiveSetting, under: Under): LiveSetting {
  const { ageShift: _shift, cooling: _model, ...rest } = setting;
  const { ageShift = 0, cooling = COOLING_AS_RUN } = {
    ageShift: setting.ageShift,
    cooling: setting.cooling,
    ...under,
  };
  return {
    ...rest,
    ...(ageShift !== 0 && { ageShift }),
    ...(cooling !== COOLING_AS_RUN && { cooling }),
  };
}

export function isSameSetting(one: LiveSetting, other: LiveSetting): boolean {
  return (
    isSameDefinition(one.definition, other.definition) &&
    Math.abs(one.credibleLevel - other.credibleLevel) < 1e-9 &&
    one.detections === other.detections &&
    one.likelihood === other.likelihood &&
    candidatesToText(one.candidates) === candidatesToText(other.candidates) &&
    one.background === other.background &&
    one.ageShift === other.ageShift &&
    one.cooling === other.cooling &&
    priorToText(one.prior) === priorToText(other.prior)
  );
}

const definitionFields = [
  'massMinMjup',
  'massMaxMjup',
  'semiMajorAxisMinAu',
  'semiMajorAxisMaxAu',
  'massIndex',
  'semiMajorAxisIndex',
] as const;

export function isSameDefinition(one: PowerLawDefinition, other: PowerLawDefinition): boolean {
  return definitionFields.every(
    (field) => Math.abs(one[field] - other[field]) <= 1e-9 * Math.max(1, Math.abs(one[field])),
  );
}

/** A value as a person would write it: what dragging gives is not exact to the last bit. */
export function tidy(value: number, digits = 6): number {
  return Number(value.toPrecision(digits));
}

/** What is left at the saved value stays out of the address. */
export function settingToQuery(setting: LiveSetting, saved: LiveSetting): Record<string, string> {
  const query = definitionToQuery(setting.definition, saved.definition);
  if (Math.abs(setting.credibleLevel - saved.credibleLevel) > 1e-9) {
    query.level = String(tidy(setting.credibleLevel));
  }
  if (setting.detections !== saved.detections) query.det = setting.detections;
  if (setting.likelihood !== saved.likelihood) query.likelihood = setting.likelihood;
  const candidates = candidatesToText(setting.candidates);
  if (candidates !== candidatesToText(saved.candidates)) query.cand = candidates;
  if (priorToText(setting.prior) !== priorToText(saved.prior)) {
    query.prior = priorToText(setting.prior);
  }
  if (setting.ageShift !== saved.ageShift) query.age = String(tidy(setting.ageShift ?? 0));
  if (setting.cooling !== saved.cooling) query.cooling = setting.cooling ?? COOLING_AS_RUN;
  return query;
}

export function definitionToQuery(
  definition: PowerLawDefinition,
  saved: PowerLawDefinition,
): Record<string, string> {
  const query: Record<string, string> = {};
  const differs = (field: (typeof definitionFields)[number]) =>
    Math.abs(definition[field] - saved[field]) > 1e-9 * Math.max(1, Math.abs(saved[field]));
  if (differs('massMinMjup') || differs('massMaxMjup')) {
    query.mass = `${tidy(definition.massMinMjup)}-${tidy(definition.massMaxMjup)}`;
  }
  if (differs('semiMajorAxisMinAu') || differs('semiMajorAxisMaxAu')) {
    query.axis = `${tidy(definition.semiMajorAxisMinAu)}-${tidy(definition.semiMajorAxisMaxAu)}`;
  }
  if (differs('massIndex')) {
    query.alpha = String(tidy(fromLogIndex(definition.massIndex, 'linear')));
  }
  if (differs('semiMajorAxisIndex')) {
    query.beta = String(tidy(fromLogIndex(definition.semiMajorAxisIndex, 'linear')));
  }
  return query;
}

/** "none", "fixed", "rate:0.2": what is done with candidates without an answer. */
function candidatesToText(candidates: LiveSetting['candidates']): string {
  if (candidates === undefined) return 'none';
  return candidates.treatment === 'fixed' ? 'fixed' : `rate:${candidates.referenceRate}`;
}

/** "uniform:1", "log-uniform:0.001:1", "beta:0.5:0.5": the law, then its numbers. */
export function priorToText(prior: RatePrior): string {
  switch (prior.law) {
    case 'uniform':
      return `uniform:${prior.max}`;
    case 'log-uniform':
      return `log-uniform:${prior.min}:${prior.max}`;
    case 'jeffreys':
      return prior.max === undefined ? 'jeffreys' : `jeffreys:${prior.max}`;
    case 'gamma':
      return `gamma:${prior.shape}:${prior.rate}`;
    case 'beta':
      return `beta:${prior.a}:${prior.b}`;
    case 'tabulated':
      // Too long for an address: whoever opens it gets the run's own prior.
      return `tabulated:${prior.source ?? prior.value.length}`;
  }
}
