import { z } from 'zod';
import { idSchema } from './common';
import { startConditionSchema } from './cooling';
import { sweepParameterSchema, systematicChangeSchema } from './study-settings';

const numbers = z.array(z.number());
const pair = z.tuple([z.number(), z.number()]);
const curve = z.object({ value: numbers, density: numbers });
/** Rows of y, columns of x; density per unit of both. */
const plane = z.object({ x: numbers, y: numbers, density: z.array(numbers) });

const parameterSchema = z.object({
  mean: z.number(),
  median: z.number(),
  standardDeviation: z.number(),
  interval68: pair,
  interval95: pair,
  marginal: curve,
});

export const freeIndicesResultSchema = z.object({
  kind: z.literal('free-indices'),
  limit: z.number(),
  /** The run's limit, its indices fixed. */
  limitFixed: z.number(),
  levels: z.array(z.object({ level: z.number(), limit: z.number() })),
  rate: parameterSchema,
  /** Indices per natural logarithm. */
  massIndex: parameterSchema,
  semiMajorAxisIndex: parameterSchema,
  rateByMassIndex: plane,
  rateBySemiMajorAxisIndex: plane,
  massIndexBySemiMajorAxisIndex: plane,
  correlations: z.object({
    rateMassIndex: z.number(),
    rateSemiMajorAxisIndex: z.number(),
    indices: z.number(),
  }),
  /** Null for a prior that cannot be normalised. */
  logEvidence: z.number().nullable(),
  nodes: z.number(),
  /** Relative move of the limit when the nodes were last doubled. */
  movedBy: z.number(),
  notes: z.array(z.string()),
});

export const limitMapResultSchema = z.object({
  kind: z.literal('limit-map'),
  massMjup: numbers,
  semiMajorAxisAu: numbers,
  /** Rows of mass: limit with no detection and all companions at the node. */
  limit: z.array(numbers),
  summed: z.array(numbers),
  isSetByPrior: z.array(z.array(z.boolean())),
  /** Limit for the population beyond each node; null where nothing of it can be seen. */
  tail: z.array(z.array(z.number().nullable())).nullable(),
  notes: z.array(z.string()),
});

export const sweepResultSchema = z.object({
  kind: z.literal('sweep'),
  over: sweepParameterSchema,
  value: numbers,
  limit: numbers,
  limitZero: numbers,
  exposure: numbers,
  detections: numbers,
  isSetByPrior: z.array(z.boolean()),
  /** Both indices: rows of the mass index, columns of the semi-major axis index. */
  plane: z
    .object({ massIndex: numbers, semiMajorAxisIndex: numbers, limit: z.array(numbers) })
    .nullable(),
  notes: z.array(z.string()),
});

export const systematicsResultSchema = z.object({
  kind: z.literal('systematics'),
  baseline: z.number(),
  rows: z.array(
    z.object({
      change: systematicChangeSchema,
      label: z.string(),
      limit: z.number().nullable(),
      ratio: z.number().nullable(),
      exposure: z.number().nullable(),
      /** Why there is no limit. */
      fault: z.string().nullable(),
      /** Stars whose map the change cannot touch, such as uploaded ones. */
      starsUnchanged: z.number(),
    }),
  ),
  notes: z.array(z.string()),
});

export const agesCoolingResultSchema = z.object({
  kind: z.literal('ages-cooling'),
  baseline: z.number(),
  /** Of every star, in sigma of its own age. */
  ageShifts: numbers,
  /** The run's own first. */
  models: z.array(
    z.object({
      /** `as-run`, `built-in` or the id of a cooling table. */
      model: z.string(),
      name: z.string(),
      startCondition: startConditionSchema,
      /** One for each age shift. */
      shifts: z.array(
        z.object({
          limit: z.number().nullable(),
          exposure: z.number().nullable(),
          /** Why there are no maps, or no limit. */
          fault: z.string().nullable(),
          /** Whether maps for it are stored with this answer. */
          hasMaps: z.boolean(),
          starsUnchanged: z.number(),
        }),
      ),
    }),
  ),
  notes: z.array(z.string()),
});

export const overlapRulesResultSchema = z.object({
  kind: z.literal('overlap-rules'),
  ruleUsed: z.string(),
  rules: z.array(
    z.object({
      rule: z.enum(['same-position', 'deepest', 'independent', 'refuse']),
      limit: z.number().nullable(),
      exposure: z.number().nullable(),
      fault: z.string().nullable(),
    }),
  ),
  /** What holds whatever the correlation between the epochs. */
  bracket: z.object({ lowest: z.number(), highest: z.number() }),
  shared: z.array(
    z.object({
      starId: idSchema,
      name: z.string(),
      surveys: z.array(z.string()),
      probability: z.object({
        samePosition: z.number().nullable(),
        deepest: z.number(),
        independent: z.number(),
      }),
    }),
  ),
  notes: z.array(z.string()),
});

const withoutSchema = z.object({
  limit: z.number(),
  /** Limit without it over the limit with all. */
  ratio: z.number(),
  exposure: z.number(),
});
export const influenceResultSchema = z.object({
  kind: z.literal('influence'),
  limit: z.number(),
  exposure: z.number(),
  stars: z.array(
    z.object({
      starId: idSchema,
      name: z.string(),
      probability: z.number(),
      hosts: z.array(z.string()),
      without: withoutSchema,
    }),
  ),
  surveys: z.array(
    z.object({ id: idSchema, name: z.string(), stars: z.number(), without: withoutSchema }),
  ),
  groups: z.array(z.object({ name: z.string(), stars: z.number(), without: withoutSchema })),
  /** So many stars carry half of the exposure. */
  halfCarriedBy: z.number(),
  notes: z.array(z.string()),
});

export const comparisonResultSchema = z.object({
  kind: z.literal('population-comparison'),
  rows: z.array(
    z.object({
      populationId: idSchema,
      key: z.string(),
      version: z.number(),
      name: z.string(),
      words: z.string(),
      isOwn: z.boolean(),
      limit: z.number().nullable(),
      exposure: z.number().nullable(),
      detections: z.number().nullable(),
      logEvidence: z.number().nullable(),
      /** ln B against the run's own population. */
      logBayesFactor: z.number().nullable(),
      fault: z.string().nullable(),
    }),
  ),
  notes: z.array(z.string()),
});

export const countsResultSchema = z.object({
  kind: z.literal('counts'),
  rate: z.number(),
  /** P(k detections), k = 0, 1, …, at that rate, exactly. */
  atRate: numbers,
  /** The same survey again, its rate from the posterior. */
  predictive: numbers,
  counted: z.number(),
  /** P(at least as many as were counted) at that rate. */
  atLeastCounted: z.number(),
  notes: z.array(z.string()),
});

export const forecastResultSchema = z.object({
  kind: z.literal('forecast'),
  stars: z.number(),
  exposure: z.number(),
  yield: z.object({ mean: z.number(), median: z.number(), interval68: pair }),
  /** P(n detections), n = 0, 1, … */
  distribution: numbers,
  chanceOfNone: z.number(),
  limitIfNone: z.number(),
  /** With the run's own data and detections added. */
  limitIfNoneTogether: z.number(),
  against: z.object({
    stars: numbers,
    limitIfNone: numbers,
    /** 68 % of outcomes at the assumed rate. */
    low: numbers,
    high: numbers,
  }),
  wantedLimit: z.number(),
  /** Smallest number of such stars that reaches it with no detection; null: none of 100 000. */
  starsNeeded: z.number().nullable(),
  /** Largest gain first. */
  gain: z.array(
    z.object({ name: z.string(), probability: z.number(), limitWithItAlone: z.number() }),
  ),
  notes: z.array(z.string()),
});

const coverageSchema = z.object({
  level: z.number(),
  observed: z.number(),
  standardError: z.number(),
  /** What theory predicts, averaged over the prior. */
  expected: z.number(),
});
export const calibrationResultSchema = z.object({
  kind: z.literal('calibration'),
  surveys: z.number(),
  seed: z.string(),
  parts: z.number(),
  ranks: z.object({
    draws: z.number(),
    bins: numbers,
    chiSquare: z.number(),
    pValue: z.number(),
    /** Largest distance of the ranks' cumulative from uniform, and its 99.9 % band. */
    ecdfDistance: z.number(),
    ecdfBand: z.number(),
    kolmogorovP: z.number(),
  }),
  coverage: z.array(coverageSchema),
  /** Coverage of the limit at the run's level for fixed truths. */
  atTruth: z.array(
    z.object({
      rate: z.number(),
      /** Null where stars of unequal completeness leave it open by more than a hundredth. */
      exact: z.number().nullable(),
      observed: z.number(),
      standardError: z.number(),
    }),
  ),
  /** Mean of (median of the posterior − truth). */
  medianBias: z.object({ mean: z.number(), standardError: z.number() }),
  passes: z.boolean(),
  verdict: z.string(),
  /** Truth drawn from another population than the analysis assumes. */
  otherTruth: z
    .object({ population: z.string(), coverage: z.array(coverageSchema), verdict: z.string() })
    .nullable(),
  notes: z.array(z.string()),
});

export const studyResultSchema = z.discriminatedUnion('kind', [
  freeIndicesResultSchema,
  limitMapResultSchema,
  sweepResultSchema,
  systematicsResultSchema,
  agesCoolingResultSchema,
  overlapRulesResultSchema,
  influenceResultSchema,
  comparisonResultSchema,
  countsResultSchema,
  forecastResultSchema,
  calibrationResultSchema,
]);
export type StudyResult = z.infer<typeof studyResultSchema>;
export type ResultOf<Kind extends StudyResult['kind']> = Extract<StudyResult, { kind: Kind }>;
