import type { RatePrior } from '@/lib/inference';
import { toLogIndex } from '@/lib/population';
import { analysisRecipeSchema, ratePriorSchema } from '@/lib/schemas/analyses';
import { idSchema } from '@/lib/schemas/common';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import { AGE_SHIFTS, COOLING_BUILT_IN } from '@/lib/schemas/stack-choices';
import { type LiveSetting, type Query, tidy, withInputs, withLikelihood } from './live-setting';

/**
 * Reads a setting from an address; a part that cannot be read keeps the saved value. The server
 * reads it: the schemas stay out of what the page loads.
 */
export function settingFromQuery(query: Query, saved: LiveSetting): LiveSetting {
  const level = Number(query.level);
  const asked =
    query.likelihood === 'mean-number' || query.likelihood === 'host-fraction'
      ? withLikelihood(saved, query.likelihood, saved)
      : saved;
  const candidates = candidatesFromText(query.cand, saved.candidates);
  const { candidates: _saved, ...rest } = asked;
  const setting: LiveSetting = {
    ...rest,
    ...(candidates && { candidates }),
    definition: definitionFromQuery(query, saved.definition),
    credibleLevel: level > 0 && level < 1 ? level : saved.credibleLevel,
    detections: query.det === 'none' || query.det === 'counted' ? query.det : saved.detections,
    prior: priorFromText(query.prior) ?? asked.prior,
  };
  return withInputs(setting, { ageShift: readShift(query.age), cooling: readModel(query.cooling) });
}

function readShift(text: string | undefined): number | undefined {
  const shift = Number(text ?? '');
  const isStored = shift >= AGE_SHIFTS[0] && shift <= AGE_SHIFTS[AGE_SHIFTS.length - 1];
  return isStored ? tidy(shift) : undefined;
}

function readModel(text: string | undefined): string | undefined {
  return text === COOLING_BUILT_IN || idSchema.safeParse(text).success ? text : undefined;
}

function definitionFromQuery(query: Query, saved: PowerLawDefinition): PowerLawDefinition {
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
