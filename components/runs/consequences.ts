import { type PriorLaw, priorLaws, priorOfLaw } from '@/components/analyses/prior-choice';
import {
  answerFromView,
  contractStillAxis,
  type Likelihood,
  type PopulationView,
  upperLimit,
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
import { type LiveSetting, withInputs, withLikelihood } from './live-setting';
import { sampleUnder } from './live-stacks';
import { LiveViews, otherAxis, viewContracted } from './live-views';
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
  /** By model, of those that the sample has maps for. */
  cooling: Record<string, number | undefined>;
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

function* switchesInSteps(
  sample: LiveSample,
  view: PopulationView,
  setting: LiveSetting,
  saved: LiveSetting,
  laws: PriorLaw[],
): Steps<Omit<SwitchConsequences, 'cooling'>> {
  function* limit(changed: LiveSetting): Steps<number | undefined> {
    yield;
    return orNull(() => answerFromView(view, askedOf(sample, changed)).limit) ?? undefined;
  }
  const followed = rateDependent(setting, saved);
  const treated = (candidates: LiveSetting['candidates']) => limit({ ...setting, candidates });
  const ofLikelihood = (likelihood: Likelihood) =>
    limit(withLikelihood(setting, likelihood, saved));
  const prior: SwitchConsequences['prior'] = {};
  for (const law of laws) {
    prior[law] = yield* limit({ ...setting, prior: priorChosen(law, setting, saved) });
  }
  return {
    detections: {
      counted: yield* limit({ ...setting, detections: 'counted' }),
      none: yield* limit({ ...setting, detections: 'none' }),
    },
    candidates: {
      none: yield* treated(undefined),
      fixed: yield* treated({ treatment: 'fixed' }),
      'rate-dependent': followed && (yield* treated(followed)),
    },
    likelihood: {
      'host-fraction': yield* ofLikelihood('host-fraction'),
      'mean-number': yield* ofLikelihood('mean-number'),
    },
    prior,
  };
}

/** What every other position of every control would give. */
export interface Consequences {
  /** Against the linear index. */
  massIndex: Trace;
  semiMajorAxisIndex: Trace;
  /** Against the level [fraction]. */
  level: Trace;
  /** Against the shift of all ages [sigma of each]; null without maps of other ages. */
  age: Trace | null;
  switches: SwitchConsequences;
}

const LEVEL_STEPS = 48;

/**
 * Work that may be laid down after each step, for what is more urgent.
 *
 * The last value is the answer.
 */
export type Steps<Answer> = Generator<void, Answer>;

/** @returns null where the population lies outside the maps */
export function* consequencesInSteps(
  sample: LiveSample,
  setting: LiveSetting,
  saved: LiveSetting,
): Steps<Consequences | null> {
  const views = viewsOf(sample);
  const view = orNull(() => views.of(setting.definition, setting));
  if (view === null) return null;
  const levels = trackOf(TRACK.level, setting.credibleLevel, saved.credibleLevel);
  const laws = lawsOffered(setting, saved);
  yield;
  const switches = yield* switchesInSteps(sample, view, setting, saved, laws);
  return {
    massIndex: yield* linearTrackInSteps(sample, setting, saved, 'massIndex'),
    semiMajorAxisIndex: yield* linearTrackInSteps(sample, setting, saved, 'semiMajorAxisIndex'),
    level: traceLevel(sample, view, setting, spread(levels, LEVEL_STEPS)),
    age: yield* ageTrackInSteps(sample, setting),
    switches: { ...switches, cooling: yield* coolingInSteps(sample, setting) },
  };
}

const keptViews = new WeakMap<LiveSample, LiveViews>();

/** Views of a sample that keep what the setting before had in common with the next. */
function viewsOf(sample: LiveSample): LiveViews {
  const views = keptViews.get(sample) ?? new LiveViews(sample);
  keptViews.set(sample, views);
  return views;
}

const limitUnder = (sample: LiveSample, setting: LiveSetting) =>
  orNull(
    () =>
      answerFromView(viewsOf(sample).of(setting.definition, setting), askedOf(sample, setting))
        .limit,
  );

/** Places on the track between two stored shifts. */
const PER_SHIFT = 4;

/** The limit against the shift of all ages, NaN where there are no maps. */
function* ageTrackInSteps(sample: LiveSample, setting: LiveSetting): Steps<Trace | null> {
  const { ageShifts = [] } = sample.further ?? {};
  if (ageShifts.length === 0) return null;
  const [from, to] = [ageShifts[0], ageShifts[ageShifts.length - 1]];
  const values = spread([from, to], PER_SHIFT * (ageShifts.length - 1));
  const others = { ...setting, ageShift: undefined };
  return yield* keptTrackInSteps(sample, 'ageShift', others, values, function* () {
    const limits: number[] = [];
    for (const ageShift of values) {
      yield;
      limits.push(limitUnder(sample, withInputs(setting, { ageShift })) ?? Number.NaN);
    }
    return limits;
  });
}

function* coolingInSteps(
  sample: LiveSample,
  setting: LiveSetting,
): Steps<SwitchConsequences['cooling']> {
  const limits: SwitchConsequences['cooling'] = {};
  for (const model of sample.further?.models ?? []) {
    yield;
    limits[model] = limitUnder(sample, withInputs(setting, { cooling: model })) ?? undefined;
  }
  return limits;
}

/** All steps at once. */
export function finishSteps<Answer>(steps: Steps<Answer>): Answer {
  for (;;) {
    const { done, value } = steps.next();
    if (done) return value;
  }
}

type IndexField = 'massIndex' | 'semiMajorAxisIndex';

/** The last track of a control: it stays the same while its own control is moved. */
const lastTracks = new WeakMap<
  LiveSample,
  Map<IndexField | 'ageShift', { key: string; track: Trace }>
>();

/** @param others the setting without what the control moves */
function* keptTrackInSteps(
  sample: LiveSample,
  control: IndexField | 'ageShift',
  others: object,
  values: number[],
  limitsInSteps: () => Steps<number[]>,
): Steps<Trace> {
  const key = JSON.stringify([others, values]);
  const kept = lastTracks.get(sample) ?? new Map();
  const last = kept.get(control);
  if (last?.key === key) return last.track;
  const track = { values, limits: yield* limitsInSteps() };
  lastTracks.set(sample, kept.set(control, { key, track }));
  return track;
}

/** The track of an index between its ends, both in the linear convention. */
export function* linearTrackInSteps(
  sample: LiveSample,
  setting: LiveSetting,
  saved: LiveSetting,
  field: IndexField,
): Steps<Trace> {
  const linear = (of: LiveSetting) => fromLogIndex(of.definition[field], 'linear');
  const values = spread(trackOf(TRACK[field], linear(setting), linear(saved)));
  const others = { ...setting, definition: { ...setting.definition, [field]: undefined } };
  return yield* keptTrackInSteps(sample, field, others, values, () =>
    limitsAgainstIndex(sample, setting, field, values),
  );
}

/** NaN where there is none; only the moving axis is weighed anew. */
function* limitsAgainstIndex(
  sample: LiveSample,
  setting: LiveSetting,
  field: IndexField,
  linearIndices: number[],
): Steps<number[]> {
  const { definition } = setting;
  const { grid } = sample;
  const asked = askedOf(sample, setting);
  const weights = orNull(() => populationWeights(grid, definition));
  const maps = orNull(() => sampleUnder(sample, setting).maps);
  if (weights === null || maps === null) return linearIndices.map(() => Number.NaN);
  const moving: MovingAxis = field === 'massIndex' ? 'mass' : 'semiMajorAxis';
  const contracted = contractStillAxis(maps, grid, moving, weights[otherAxis[moving]]);
  const limits: number[] = [];
  for (const index of linearIndices) {
    yield;
    const population = { ...definition, [field]: toLogIndex(index, 'linear') };
    const limit = orNull(() => {
      const moved = weightsWhileMoving(grid, population, moving, weights);
      return answerFromView(viewContracted(contracted, moved, population), asked).limit;
    });
    limits.push(limit ?? Number.NaN);
  }
  return limits;
}
