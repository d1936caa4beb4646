import { type PriorLaw, priorLaws, priorOfLaw } from '@/components/analyses/prior-choice';
import {
  answerFromView,
  contractStillAxis,
  type Likelihood,
  type PopulationView,
  upperLimit,
  viewPopulation,
} from '@/lib/inference';
import {
  fromLogIndex,
  type MovingAxis,
  populationWeights,
  toLogIndex,
  weightsWhileMoving,
} from '@/lib/population';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { askedOf } from './live-answer';
import type { LiveSample } from './live-sample';
import { type LiveSetting, withLikelihood } from './live-setting';
import { otherAxis, viewContracted } from './live-views';
import { orNull } from './or-null';
import { TRACK, trackOf } from './tracks';

/** The limit as a function of one control, all others standing still. */
export interface Trace {
  values: number[];
  /** NaN where the setting has no answer. */
  limits: number[];
}

const STEPS = 16;

export function spread([from, to]: [number, number], steps = STEPS): number[] {
  return Array.from({ length: steps + 1 }, (_, i) => from + (i * (to - from)) / steps);
}

const fieldOf = { mass: 'massIndex', semiMajorAxis: 'semiMajorAxisIndex' } as const;

/** Limits against one index; only the moving axis is weighed anew. */
export function traceIndex(
  sample: LiveSample,
  setting: LiveSetting,
  moving: MovingAxis,
  logIndices: number[],
): Trace {
  const { definition } = setting;
  const asked = askedOf(sample, setting);
  const still = orNull(() => populationWeights(sample.grid, definition));
  if (still === null) return { values: logIndices, limits: logIndices.map(() => Number.NaN) };
  const { maps, grid } = sample;
  const contracted = contractStillAxis(maps, grid, moving, still[otherAxis[moving]]);
  const limits = logIndices.map((index) => {
    const population = { ...definition, [fieldOf[moving]]: index };
    const limit = orNull(() => {
      const weights = weightsWhileMoving(grid, population, moving, still);
      return answerFromView(viewContracted(contracted, weights, population), asked).limit;
    });
    return limit ?? Number.NaN;
  });
  return { values: logIndices, limits };
}

export function traceLevel(
  sample: LiveSample,
  view: PopulationView,
  setting: LiveSetting,
  levels: number[],
): Trace {
  const full = orNull(() => answerFromView(view, askedOf(sample, setting)));
  return {
    values: levels,
    limits: levels.map((level) => (full === null ? Number.NaN : upperLimit(full.posterior, level))),
  };
}

/** What each option of each switch would give; undefined where it gives no answer. */
export interface SwitchConsequences {
  detections: Record<AnalysisRecipe['detections'], number | undefined>;
  candidates: Record<CandidateChoice, number | undefined>;
  likelihood: Record<Likelihood, number | undefined>;
  prior: Partial<Record<PriorLaw, number | undefined>>;
}

export type CandidateChoice = NonNullable<LiveSetting['candidates']>['treatment'] | 'none';

/** The treatment with a rate that somebody gave, in the setting or in the run. */
export function rateDependent(setting: LiveSetting, saved: LiveSetting): LiveSetting['candidates'] {
  return [setting, saved].find((one) => one.candidates?.treatment === 'rate-dependent')?.candidates;
}

/** A prior of a law; a table is that of the run, since no control makes one. */
export function priorChosen(law: PriorLaw, setting: LiveSetting, saved: LiveSetting) {
  const isTable = law === 'tabulated' && saved.prior.law === law;
  return priorOfLaw(law, setting.likelihood, isTable ? saved.prior : setting.prior);
}

/** The laws on offer: a table only where the run or the setting has one for this quantity. */
export function lawsOffered(setting: LiveSetting, saved: LiveSetting): PriorLaw[] {
  const own = saved.likelihood === setting.likelihood ? [saved.prior.law] : [];
  return [...new Set([...priorLaws(setting.likelihood), setting.prior.law, ...own])];
}

export function switchConsequences(
  sample: LiveSample,
  view: PopulationView,
  setting: LiveSetting,
  saved: LiveSetting,
  laws: PriorLaw[],
): SwitchConsequences {
  const limit = (changed: LiveSetting) =>
    orNull(() => answerFromView(view, askedOf(sample, changed)).limit) ?? undefined;
  const followed = rateDependent(setting, saved);
  const treated = (candidates: LiveSetting['candidates']) => limit({ ...setting, candidates });
  const ofLikelihood = (likelihood: Likelihood) =>
    limit(withLikelihood(setting, likelihood, saved));
  return {
    detections: {
      counted: limit({ ...setting, detections: 'counted' }),
      none: limit({ ...setting, detections: 'none' }),
    },
    candidates: {
      none: treated(undefined),
      fixed: treated({ treatment: 'fixed' }),
      'rate-dependent': followed && treated(followed),
    },
    likelihood: {
      'host-fraction': ofLikelihood('host-fraction'),
      'mean-number': ofLikelihood('mean-number'),
    },
    prior: Object.fromEntries(
      laws.map((law) => [law, limit({ ...setting, prior: priorChosen(law, setting, saved) })]),
    ),
  };
}

/** What every other position of every control would give. */
export interface Consequences {
  /** Against the linear index. */
  massIndex: Trace;
  semiMajorAxisIndex: Trace;
  /** Against the level [fraction]. */
  level: Trace;
  switches: SwitchConsequences;
}

const LEVEL_STEPS = 48;

/** @returns null where the population lies outside the maps */
export function consequencesOf(
  sample: LiveSample,
  setting: LiveSetting,
  saved: LiveSetting,
): Consequences | null {
  const view = orNull(() => viewPopulation(sample.maps, sample.grid, setting.definition));
  if (view === null) return null;
  const levels = trackOf(TRACK.level, setting.credibleLevel, saved.credibleLevel);
  const laws = lawsOffered(setting, saved);
  return {
    massIndex: linearTrace(sample, setting, saved, 'massIndex'),
    semiMajorAxisIndex: linearTrace(sample, setting, saved, 'semiMajorAxisIndex'),
    level: traceLevel(sample, view, setting, spread(levels, LEVEL_STEPS)),
    switches: switchConsequences(sample, view, setting, saved, laws),
  };
}

/** The track of an index between its ends, both in the linear convention. */
export function linearTrace(
  sample: LiveSample,
  setting: LiveSetting,
  saved: LiveSetting,
  field: 'massIndex' | 'semiMajorAxisIndex',
): Trace {
  const linear = (of: LiveSetting) => fromLogIndex(of.definition[field], 'linear');
  const values = spread(trackOf(TRACK[field], linear(setting), linear(saved)));
  const { limits } = traceIndex(
    sample,
    setting,
    field === 'massIndex' ? 'mass' : 'semiMajorAxis',
    values.map((index) => toLogIndex(index, 'linear')),
  );
  return { values, limits };
}
