import { z } from 'zod';
import { idSchema, levelSchema, lineSchema, moment, positiveSchema } from './common';
import { listedPopulationSchema } from './populations';
import { runSummarySchema } from './runs';

export const ratePriorSchema = z.discriminatedUnion('law', [
  z.strictObject({ law: z.literal('uniform'), max: positiveSchema.max(1000) }),
  z.strictObject({
    law: z.literal('log-uniform'),
    min: positiveSchema,
    max: positiveSchema.max(1000),
  }),
  z.strictObject({ law: z.literal('jeffreys'), max: positiveSchema.max(1000).optional() }),
  z.strictObject({ law: z.literal('gamma'), shape: positiveSchema, rate: z.number().min(0) }),
  z.strictObject({ law: z.literal('beta'), a: positiveSchema, b: positiveSchema }),
  /** An earlier survey's posterior as this one's prior: density at values, straight between them. */
  z.strictObject({
    law: z.literal('tabulated'),
    value: z.array(z.number().min(0)).min(2).max(2000),
    density: z.array(z.number().min(0)).min(2).max(2000),
    source: lineSchema(200),
  }),
]);
export type RatePriorInput = z.infer<typeof ratePriorSchema>;
export const likelihoodSchema = z.enum(['mean-number', 'host-fraction']);

/** A prior that suits its likelihood and is whole. */
function checkRecipe(
  recipe: {
    prior: RatePriorInput;
    likelihood: z.infer<typeof likelihoodSchema>;
    background?: number;
  },
  context: z.RefinementCtx,
): void {
  const { prior, likelihood } = recipe;
  const refuse = (path: string, message: string) =>
    context.addIssue({ code: 'custom', path: ['prior', path], message });
  if (prior.law === 'log-uniform' && prior.min >= prior.max) refuse('min', 'min below max');
  if (prior.law === 'tabulated') {
    if (prior.value.length !== prior.density.length)
      refuse('density', 'one density for each value');
    if (prior.value.some((value, i) => i > 0 && value <= prior.value[i - 1]))
      refuse('value', 'increasing values');
    if (prior.density.every((density) => density === 0)) refuse('density', 'one above zero');
    if (likelihood === 'host-fraction' && prior.value[prior.value.length - 1] > 1)
      refuse('value', 'at most 1 for a fraction of stars');
  }
  if (recipe.background !== undefined && likelihood === 'host-fraction')
    context.addIssue({
      code: 'custom',
      path: ['background'],
      message: 'a known background belongs to the mean number',
    });
  if (likelihood === 'host-fraction') {
    if ('max' in prior && prior.max !== undefined && prior.max > 1)
      refuse('max', 'at most 1 for a fraction of stars');
    if (prior.law === 'gamma')
      refuse('law', 'a prior on a fraction: uniform, log-uniform, jeffreys or beta');
  } else if (prior.law === 'beta')
    refuse('law', 'a prior on a mean number: uniform, log-uniform, jeffreys or gamma');
}

/** The editable recipe of an analysis; a run keeps its own copy. */
export const analysisRecipeSchema = z
  .strictObject({
    surveyIds: z.array(idSchema).min(1, 'at least one survey').max(200),
    populationId: idSchema,
    likelihood: likelihoodSchema,
    prior: ratePriorSchema,
    credibleLevel: levelSchema.default(0.95),
    /** 'counted': confirmed companions inside the ranges; 'none': the run sets all detections aside. */
    detections: z.enum(['counted', 'none']).default('counted'),
    /** A star in several surveys: its combined map. */
    combination: z
      .enum(['default', 'same-position', 'deepest', 'independent', 'refuse'])
      .default('default'),
    /** A box that reaches past the maps: completeness is zero there only if a person says so. */
    zeroOutsideMaps: z.boolean().default(false),
    /** Candidates that nobody settled: set aside when absent, else counted with their probability. */
    candidates: z
      .discriminatedUnion('treatment', [
        z.strictObject({ treatment: z.literal('fixed') }),
        z.strictObject({
          treatment: z.literal('rate-dependent'),
          referenceRate: positiveSchema.max(1000),
        }),
      ])
      .optional(),
    /** A saved selection of these surveys' stars; all of them when absent. */
    sampleId: idSchema.optional(),
    /** A stored combination: its surveys are `surveyIds` and its rule is `combination`. */
    combinationId: idSchema.optional(),
    /** Expected number of false detections among those counted; mean number only. */
    background: positiveSchema.max(1000).optional(),
  })
  .superRefine(checkRecipe);
export type AnalysisRecipe = z.infer<typeof analysisRecipeSchema>;

/** What is not said follows the settings of the collaboration. */
export const newRecipeSchema = z
  .strictObject({
    ...analysisRecipeSchema.shape,
    credibleLevel: levelSchema.optional(),
    combination: analysisRecipeSchema.shape.combination.unwrap().optional(),
  })
  .superRefine(checkRecipe);
export type NewRecipe = z.infer<typeof newRecipeSchema>;
const nameSchema = lineSchema(120);
export const renameAnalysisSchema = z.strictObject({ name: nameSchema });
export const createAnalysisSchema = z.strictObject({
  name: nameSchema,
  recipe: newRecipeSchema,
});
export const updateAnalysisSchema = z.strictObject({
  name: nameSchema.optional(),
  recipe: analysisRecipeSchema.optional(),
});
export const copyAnalysisSchema = z.strictObject({
  name: nameSchema.optional(),
  /** Changes made in the same step, such as setting the detections aside. */
  detections: z.enum(['counted', 'none']).optional(),
});

export const analysisSchema = z.object({
  id: idSchema,
  key: z.string(),
  number: z.number(),
  name: z.string(),
  recipe: analysisRecipeSchema,
  population: listedPopulationSchema,
  surveys: z.array(
    z.object({ id: idSchema, slug: z.string(), name: z.string(), position: z.number() }),
  ),
  parent: z.string().nullable(),
  createdBy: z.string().nullable(),
  createdAt: moment,
  updatedAt: moment,
  /** Newest first. */
  runs: z.array(runSummarySchema),
  state: z.enum(['draft', 'changed', 'running', 'run', 'failed']),
  can: z.object({ run: z.boolean(), change: z.boolean(), remove: z.boolean(), copy: z.boolean() }),
});
export type AnalysisView = z.infer<typeof analysisSchema>;
