import { z } from 'zod';
import { idSchema, moment, rateQuantitySchema } from './common';
import { jobSchema } from './jobs';
import { sharedInputSchema, withdrawnSurveySchema } from './sharing';

const numbers = z.array(z.number());
const pair = z.tuple([z.number(), z.number()]);

export const detectionSchema = z.object({
  companionIds: z.array(idSchema),
  name: z.string(),
  starId: idSchema,
  star: z.string(),
  massMjup: z.number(),
  massErrorsMjup: pair.nullable(),
  semiMajorAxisAu: z.number(),
  semiMajorAxisErrorsAu: pair.nullable(),
});
export type DetectionView = z.infer<typeof detectionSchema>;

export const curveOfRateSchema = z.object({
  value: numbers,
  density: numbers,
  cumulative: numbers,
  prior: numbers,
});

/** Everything that a run's number was made from; its digest is the run's fingerprint. */
export const runInputsSchema = z.object({
  engineVersion: z.string(),
  seed: z.string(),
  grid: z.object({ massMjup: numbers, semiMajorAxisAu: numbers }),
  population: z.object({
    id: idSchema,
    key: z.string(),
    version: z.number(),
    name: z.string(),
    digest: z.string(),
  }),
  surveys: z.array(
    z.object({
      id: idSchema,
      slug: z.string(),
      name: z.string(),
      position: z.number(),
      entries: z.number(),
    }),
  ),
  combination: z.string(),
  cooling: z.string(),
  eccentricity: z.string(),
  threshold: z.string(),
  /** Versions of the engine that made the computed maps; runs from before this was kept hold none. */
  mapEngines: z.array(z.string()).optional(),
  /** The selection of stars, where the recipe names one. */
  sample: z
    .object({
      id: idSchema,
      key: z.string(),
      version: z.number(),
      name: z.string(),
      words: z.string(),
      digest: z.string(),
    })
    .optional(),
  /** The stored combination of the surveys, where the recipe names one. */
  storedCombination: z
    .object({
      id: idSchema,
      key: z.string(),
      version: z.number(),
      name: z.string(),
      words: z.string(),
      digest: z.string(),
    })
    .optional(),
  /** In the order of all sums: by name. */
  stars: z.array(
    z.object({
      starId: idSchema,
      name: z.string(),
      surveys: z.array(idSchema),
      mapId: idSchema,
      mapDigest: z.string(),
      mapChecksum: z.string(),
      /** Held where the population depends on the host's mass [M_Sun]. */
      hostMassMsun: z.number().optional(),
    }),
  ),
  /** Confirmed companions of these stars, whether or not they lie in the ranges. */
  companions: z.array(detectionSchema),
  undecided: z.array(
    z.object({
      name: z.string(),
      star: z.string(),
      status: z.string(),
      insideRanges: z.boolean().nullable(),
      starId: idSchema.optional(),
      probability: z.number().nullable().optional(),
      massMjup: z.number().nullable().optional(),
      semiMajorAxisAu: z.number().nullable().optional(),
    }),
  ),
  /** Tables of adopted values, once there are any, and how many of the stars rest on each. */
  adopted: z
    .array(
      z.object({
        quantity: z.enum(['age', 'distance']),
        table: z.number(),
        stars: z.number(),
      }),
    )
    .optional(),
  /** Surveys of other collaborations, where there are any, each as it stood. */
  shared: z.array(sharedInputSchema).optional(),
  leftOut: z.array(z.object({ name: z.string(), survey: z.string(), reason: z.string() })),
});
export type RunInputs = z.infer<typeof runInputsSchema>;

const answerSchema = z.object({
  limit: z.number(),
  median: z.number(),
  mean: z.number(),
  interval68: pair,
  highestDensity68: pair,
  intervalAtLevel: pair,
  isSetByPrior: z.boolean(),
  isConstrained: z.boolean(),
  curve: curveOfRateSchema,
});

export const runResultSchema = z.object({
  quantity: rateQuantitySchema,
  credibleLevel: z.number(),
  stars: z.number(),
  entries: z.number(),
  exposure: z.number(),
  /** With the detections that the recipe counts. */
  answer: answerSchema,
  /** The same sample with all detections set aside. */
  zero: answerSchema,
  /** Log-uniform prior: the limit at a tenth of the floor. */
  atTenthOfFloor: z.number().nullable(),
  counted: z.array(detectionSchema),
  outside: z.array(detectionSchema),
  /** Second companions of one star that the host fraction counts once. */
  mergedNames: z.array(z.string()),
  levels: z.array(
    z.object({
      level: z.number(),
      hostFraction: z.number().nullable(),
      meanNumber: z.number().nullable(),
      hostFractionZero: z.number().nullable(),
      meanNumberZero: z.number().nullable(),
    }),
  ),
  /** Frequentist limits and intervals of the same data, and how they differ from the credible ones. */
  beside: z
    .object({
      rows: z.array(
        z.object({
          name: z.string(),
          lower: z.number().nullable(),
          upper: z.number(),
          level: z.number(),
          isApproximate: z.boolean(),
          source: z.string(),
        }),
      ),
      sentence: z.string(),
    })
    .nullable()
    .default(null),
  /** Unsettled candidates that count with their probability. */
  candidates: z
    .object({
      treatment: z.enum(['fixed', 'rate-dependent']),
      referenceRate: z.number().nullable(),
      entries: z.array(z.object({ name: z.string(), star: z.string(), probability: z.number() })),
    })
    .nullable()
    .default(null),
  background: z.number().nullable().default(null),
  /** Where host-mass scaling cut the prior of a fraction. */
  priorCutAt: z.number().nullable().default(null),
  shareOutsideMaps: z.number(),
  shareFlaggedCooling: z.number(),
  /** Rows of mass, columns of semi-major axis; average over the stars. */
  meanMap: z.object({
    massMjup: numbers,
    semiMajorAxisAu: numbers,
    completeness: z.array(numbers),
  }),
  depth: z.object({
    semiMajorAxisAu: numbers,
    surveys: z.array(z.object({ id: idSchema, stars: numbers })),
  }),
  starTable: z.array(
    z.object({
      starId: idSchema,
      name: z.string(),
      surveys: z.array(idSchema),
      probability: z.number(),
      hosts: z.array(z.string()),
    }),
  ),
  statement: z.object({ sentence: z.string(), conditions: z.array(z.string()) }),
});
export type RunResult = z.infer<typeof runResultSchema>;
export type RateAnswer = z.infer<typeof answerSchema>;

export const runSummarySchema = z.object({
  id: idSchema,
  number: z.number(),
  job: jobSchema,
  createdBy: z.string().nullable(),
  createdAt: moment,
  finishedAt: moment.nullable(),
  quantity: rateQuantitySchema.nullable(),
  credibleLevel: z.number(),
  limit: z.number().nullable(),
  zeroLimit: z.number().nullable(),
  median: z.number().nullable(),
  interval68: pair.nullable(),
  detections: z.number().nullable(),
  stars: z.number().nullable(),
  resultDigest: z.string().nullable(),
  /** A newer input exists than the one this run used. */
  hasOlderInputs: z.boolean(),
  /** Kept for good with its inputs; `released` while a published release holds it. */
  frozen: z.enum(['frozen', 'released']).nullable(),
  /** Shared surveys of this run that their owners take back, or have taken back. */
  withdrawn: z.array(withdrawnSurveySchema).optional(),
});
export type RunSummary = z.infer<typeof runSummarySchema>;

export const runSchema = runSummarySchema.extend({
  analysis: z.object({ id: idSchema, key: z.string(), name: z.string() }),
  recipe: z.unknown(),
  seed: z.string(),
  engineVersion: z.string(),
  inputsDigest: z.string().nullable(),
  inputs: runInputsSchema.nullable(),
  result: runResultSchema.nullable(),
});
export type RunView = z.infer<typeof runSchema>;

/**
 * What a page draws of a run's inputs: of each star's map the fingerprint of its values, by which
 * maps of two runs are compared, whoever made them.
 */
export type DrawnInputs = Omit<RunInputs, 'stars'> & {
  stars: Omit<RunInputs['stars'][number], 'mapId' | 'mapDigest'>[];
};
/** What a page draws of a result: names and surveys of its stars are in the inputs. */
export type DrawnResult = Omit<RunResult, 'starTable'> & {
  starTable: Pick<RunResult['starTable'][number], 'starId' | 'probability'>[];
};
/** A run as a page is given it; every run is one. */
export type DrawnRun = Omit<RunView, 'inputs' | 'result'> & {
  inputs: DrawnInputs | null;
  result: DrawnResult | null;
};
