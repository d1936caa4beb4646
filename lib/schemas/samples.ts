import { z } from 'zod';
import { idSchema, lineSchema, moment, positiveSchema } from './common';
import { spectralClasses } from './spectral-classes';

export { spectralClasses } from './spectral-classes';

/** First letters of spectral types, hottest first. */
export const spectralClassSchema = z.enum(spectralClasses);
export type SpectralClass = z.infer<typeof spectralClassSchema>;

const rangeSchema = z
  .strictObject({ min: positiveSchema.optional(), max: positiveSchema.optional() })
  .refine(({ min, max }) => min !== undefined || max !== undefined, 'at least one end')
  .refine(({ min, max }) => min === undefined || max === undefined || min <= max, {
    path: ['max'],
    message: 'not below the lower end',
  });
export type SampleRange = z.infer<typeof rangeSchema>;

/** A selection of stars as a query: every part that is given must hold, both ends included. */
export const sampleDefinitionSchema = z.strictObject({
  /** Stars that at least one of these surveys lists. */
  surveyIds: z.array(idSchema).min(1).max(200).optional(),
  spectralType: z
    .strictObject({ from: spectralClassSchema, to: spectralClassSchema })
    .refine(({ from, to }) => spectralClasses.indexOf(from) <= spectralClasses.indexOf(to), {
      path: ['to'],
      message: 'not hotter than the first',
    })
    .optional(),
  ageMyr: rangeSchema.optional(),
  distancePc: rangeSchema.optional(),
  hostMassMsun: rangeSchema.optional(),
  movingGroups: z.array(lineSchema(100)).min(1).max(100).optional(),
  multiplicity: z.enum(['single', 'multiple']).optional(),
  /** Entries that a survey lists because a companion was known: they are no fair draw. */
  knownCompanion: z.enum(['left-out', 'kept']).default('left-out'),
  /** A star of which an asked fact is not known: left out, unless it is to be kept. */
  unknown: z.enum(['left-out', 'kept']).default('left-out'),
});
export type SampleDefinition = z.infer<typeof sampleDefinitionSchema>;

export const createSampleSchema = z.strictObject({
  name: lineSchema(100),
  definition: sampleDefinitionSchema,
  /** Number of the sample of which this is a new version. */
  versionOf: z.number().int().positive().optional(),
});
export type CreateSample = z.input<typeof createSampleSchema>;

export const previewSampleSchema = z.strictObject({
  definition: sampleDefinitionSchema,
  /** Only what these surveys list; all that are not archived when absent. */
  surveyIds: z.array(idSchema).min(1).max(200).optional(),
});

export const sampleSchema = z.object({
  id: idSchema,
  key: z.string(),
  number: z.number(),
  version: z.number(),
  name: z.string(),
  definition: sampleDefinitionSchema,
  words: z.string(),
  digest: z.string(),
  isLatest: z.boolean(),
  usedBy: z.array(z.string()),
  createdBy: z.string().nullable(),
  createdAt: moment,
  can: z.object({ saveVersion: z.boolean() }),
});
export type SampleView = z.infer<typeof sampleSchema>;

const histogramSchema = z.object({
  /** One more than there are bins, increasing. */
  edges: z.array(z.number()),
  all: z.array(z.number()),
  selected: z.array(z.number()),
  /** Stars without this fact, not in any bin. */
  unknown: z.object({ all: z.number(), selected: z.number() }),
});
export type SampleHistogram = z.infer<typeof histogramSchema>;

export const samplePreviewSchema = z.object({
  words: z.string(),
  stars: z.object({ all: z.number(), selected: z.number() }),
  entries: z.object({ all: z.number(), selected: z.number() }),
  /** Entries that are out, by the first thing that keeps them out. */
  leftOut: z.array(z.object({ reason: z.string(), entries: z.number() })),
  ageMyr: histogramSchema.nullable(),
  distancePc: histogramSchema.nullable(),
  spectralTypes: z.array(z.object({ type: z.string(), all: z.number(), selected: z.number() })),
  movingGroups: z.array(z.object({ name: z.string(), stars: z.number() })),
});
export type SamplePreview = z.infer<typeof samplePreviewSchema>;
