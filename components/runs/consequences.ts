import { fitPrior, type PriorLaw, priorOfLaw } from '@/components/analyses/prior-choice';
import { answerFromView, type Likelihood, type PopulationView, upperLimit } from '@/lib/inference';
import { populationWeights } from '@/lib/population';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { contract, type MovingAxis, weighContracted } from './contracted';
import { askedOf, orNull } from './live-answer';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';

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
  const contracted = contract(sample, still, moving);
  const limits = logIndices.map((index) => {
    const population = { ...definition, [fieldOf[moving]]: index };
    const limit = orNull(() => {
      const weights = populationWeights(sample.grid, population);
      const completenessPerStar = weighContracted(contracted, weights[moving]);
      const view: PopulationView = {
        population,
        completenessPerStar,
        exposure: completenessPerStar.reduce((sum, c) => sum + c, 0),
        stars: sample.stars.length,
        shareOutsideMap: weights.shareOutsideMap,
      };
      return answerFromView(view, asked).limit;
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
  likelihood: Record<Likelihood, number | undefined>;
  prior: Partial<Record<PriorLaw, number | undefined>>;
}

export function switchConsequences(
  sample: LiveSample,
  view: PopulationView,
  setting: LiveSetting,
  laws: PriorLaw[],
): SwitchConsequences {
  const limit = (changes: Partial<LiveSetting>) =>
    orNull(() => answerFromView(view, askedOf(sample, { ...setting, ...changes })).limit) ??
    undefined;
  const ofLikelihood = (likelihood: Likelihood) =>
    limit({ likelihood, prior: fitPrior(setting.prior, likelihood) });
  return {
    detections: { counted: limit({ detections: 'counted' }), none: limit({ detections: 'none' }) },
    likelihood: {
      'host-fraction': ofLikelihood('host-fraction'),
      'mean-number': ofLikelihood('mean-number'),
    },
    prior: Object.fromEntries(
      laws.map((law) => [
        law,
        limit({ prior: priorOfLaw(law, setting.likelihood, setting.prior) }),
      ]),
    ),
  };
}
