import { fitLikelihood } from '@/components/analyses/prior-choice';
import type { RatePrior, RateQuantity } from '@/lib/inference';
import { fromLogIndex, toLogIndex } from '@/lib/population';
import { type AnalysisRecipe, analysisRecipeSchema, ratePriorSchema } from '@/lib/schemas/analyses';
import type { PowerLawDefinition } from '@/lib/schemas/populations';

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

export function isSameSetting(one: LiveSetting, other: LiveSetting): boolean {
  return (
    isSameDefinition(one.definition, other.definition) &&
    Math.abs(one.credibleLevel - other.credibleLevel) < 1e-9 &&
    one.detections === other.detections &&
    one.likelihood === other.likelihood &&
    candidatesToText(one.candidates) === candidatesToText(other.candidates) &&
    one.background === other.background &&
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

/** Reads a setting from an address; a part that cannot be read keeps the saved value. */
export function settingFromQuery(query: Query, saved: LiveSetting): LiveSetting {
  const level = Number(query.level);
  const asked =
    query.likelihood === 'mean-number' || query.likelihood === 'host-fraction'
      ? withLikelihood(saved, query.likelihood, saved)
      : saved;
  const candidates = candidatesFromText(query.cand, saved.candidates);
  const { candidates: _saved, ...rest } = asked;
  return {
    ...rest,
    ...(candidates && { candidates }),
    definition: definitionFromQuery(query, saved.definition),
    credibleLevel: level > 0 && level < 1 ? level : saved.credibleLevel,
    detections: query.det === 'none' || query.det === 'counted' ? query.det : saved.detections,
    prior: priorFromText(query.prior) ?? asked.prior,
  };
}

export function definitionFromQuery(query: Query, saved: PowerLawDefinition): PowerLawDefinition {
  const mass = readRange(query.mass);
  const axis = readRange(query.axis);
  const alpha = readIndex(query.alpha);
  const beta = readIndex(query.beta);
  return {
    ...saved,
    massMinMjup: mass?.[0] ?? saved.massMinMjup,
    massMaxMjup: mass?.[1] ?? saved.massMaxMjup,
    semiMajorAxisMinAu: axis?.[0] ?? saved.semiMajorAxisMinAu,
    semiMajorAxisMaxAu: axis?.[1] ?? saved.semiMajorAxisMaxAu,
    massIndex: alpha ?? saved.massIndex,
    semiMajorAxisIndex: beta ?? saved.semiMajorAxisIndex,
  };
}

function readRange(text: string | undefined): [number, number] | undefined {
  const [min, max] = (text ?? '').split('-').map(Number);
  return min > 0 && max > min && Number.isFinite(max) ? [min, max] : undefined;
}

/** The address carries the linear index, as the screen does. */
function readIndex(text: string | undefined): number | undefined {
  if (text === undefined || text.trim() === '') return undefined;
  const index = tidy(toLogIndex(Number(text), 'linear'), 9);
  return Math.abs(index) <= 10 ? index : undefined;
}

/** "none", "fixed", "rate:0.2": what is done with candidates without an answer. */
function candidatesToText(candidates: LiveSetting['candidates']): string {
  if (candidates === undefined) return 'none';
  return candidates.treatment === 'fixed' ? 'fixed' : `rate:${candidates.referenceRate}`;
}

const candidatesSchema = analysisRecipeSchema.shape.candidates;

function candidatesFromText(
  text: string | undefined,
  saved: LiveSetting['candidates'],
): LiveSetting['candidates'] {
  if (text === 'none') return undefined;
  const asked =
    text === 'fixed'
      ? { treatment: 'fixed' }
      : { treatment: 'rate-dependent', referenceRate: Number(text?.replace('rate:', '')) };
  const parsed = candidatesSchema.safeParse(asked);
  return parsed.success ? parsed.data : saved;
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

export function priorFromText(text: string | undefined): RatePrior | undefined {
  if (text === undefined) return undefined;
  const [law, ...rest] = text.split(':');
  const [first, second] = rest.map(Number);
  const candidates: Record<string, unknown> = {
    uniform: { law, max: first },
    'log-uniform': { law, min: first, max: second },
    jeffreys: rest.length === 0 ? { law } : { law, max: first },
    gamma: { law, shape: first, rate: second },
    beta: { law, a: first, b: second },
  };
  const parsed = ratePriorSchema.safeParse(candidates[law]);
  return parsed.success ? parsed.data : undefined;
}
