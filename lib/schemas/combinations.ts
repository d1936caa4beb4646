import { z } from 'zod';
import { idSchema, lineSchema, moment } from './common';
import { yardstickSchema } from './yardstick';

/** Rules for a star in several surveys; `default` and `refuse` hold for all stars or none. */
export const combinationRuleSchema = z.enum([
  'default',
  'same-position',
  'deepest',
  'independent',
  'refuse',
]);
export type CombinationRule = z.infer<typeof combinationRuleSchema>;
export const starRuleSchema = z.enum(['same-position', 'deepest', 'independent']);
export type StarRule = z.infer<typeof starRuleSchema>;

/** Several surveys as one sample: their order, the rule for shared stars, and the grid. */
export const combinationDefinitionSchema = z
  .strictObject({
    /** In order: age and distance of a shared star are those of its first. */
    surveyIds: z.array(idSchema).min(2, 'at least two surveys').max(200),
    rule: combinationRuleSchema.default('default'),
    /** Stars that follow another rule than the rest. */
    starRules: z
      .array(z.strictObject({ starId: idSchema, rule: starRuleSchema }))
      .max(10_000)
      .default([]),
    /** `common`: the nodes of all maps together, or, above 256 an axis, the finest survey's. */
    grid: z
      .discriminatedUnion('choice', [
        z.strictObject({ choice: z.literal('common') }),
        z.strictObject({ choice: z.literal('survey'), surveyId: idSchema }),
      ])
      .default({ choice: 'common' }),
  })
  .superRefine(({ surveyIds, starRules, grid, rule }, context) => {
    const refuse = (path: (string | number)[], message: string) =>
      context.addIssue({ code: 'custom', path, message });
    if (new Set(surveyIds).size < surveyIds.length) refuse(['surveyIds'], 'each survey once');
    if (new Set(starRules.map(({ starId }) => starId)).size < starRules.length)
      refuse(['starRules'], 'each star once');
    if (grid.choice === 'survey' && !surveyIds.includes(grid.surveyId))
      refuse(['grid', 'surveyId'], 'one of the surveys');
    if (rule === 'refuse' && starRules.length > 0)
      refuse(['starRules'], 'none where shared stars are refused');
  });
export type CombinationDefinition = z.infer<typeof combinationDefinitionSchema>;

export const createCombinationSchema = z.strictObject({
  name: lineSchema(100),
  definition: combinationDefinitionSchema,
  /** Number of the combination of which this is a new version. */
  versionOf: z.number().int().positive().optional(),
});
export type CreateCombination = z.input<typeof createCombinationSchema>;

export const combinationSchema = z.object({
  id: idSchema,
  key: z.string(),
  number: z.number(),
  version: z.number(),
  name: z.string(),
  definition: combinationDefinitionSchema,
  words: z.string(),
  digest: z.string(),
  isLatest: z.boolean(),
  usedBy: z.array(z.string()),
  createdBy: z.string().nullable(),
  createdAt: moment,
});
export type CombinationView = z.infer<typeof combinationSchema>;

export const previewCombinationSchema = z.strictObject({ definition: combinationDefinitionSchema });

export const combinationPreviewSchema = z.object({
  words: z.string(),
  stars: z.number(),
  entries: z.number(),
  surveys: z.array(
    z.object({
      id: idSchema,
      name: z.string(),
      position: z.number(),
      entries: z.number(),
      /** Stars that no survey before it lists. */
      newStars: z.number(),
      /** Entries that cannot count yet: no ready map. */
      withoutMap: z.number(),
      /** What it adds to the sum of sensitivities, shape [semiMajorAxis], stars. */
      adds: z.array(z.number()),
    }),
  ),
  semiMajorAxisAu: z.array(z.number()),
  /** What completeness is averaged over along the mass. */
  yardstick: yardstickSchema,
  shared: z.array(
    z.object({
      starId: idSchema,
      name: z.string(),
      surveyIds: z.array(idSchema),
      /** What the rule comes to for this star. */
      rule: starRuleSchema,
      /** Every entry has its curve and its map settings are equal: one position may be asked. */
      canSamePosition: z.boolean(),
    }),
  ),
});
export type CombinationPreview = z.infer<typeof combinationPreviewSchema>;
