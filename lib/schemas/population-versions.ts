import { z } from 'zod';
import { lineSchema } from './common';
import { listedPopulationSchema, populationDefinitionSchema, statedIn } from './populations';

/** A new version of a population: what is left out stays as in the version before. */
export const createVersionSchema = z.strictObject({
  name: lineSchema(100).optional(),
  note: z.string().max(2000).default(''),
  ...statedIn,
  definition: populationDefinitionSchema,
  isShared: z.boolean().optional(),
});
export type CreateVersion = z.infer<typeof createVersionSchema>;

/** The definition of a version never changes; whether all may rest on it does. */
export const sharePopulationSchema = z.strictObject({ isShared: z.boolean() });
export const populationVersionQuerySchema = z.strictObject({
  version: z.coerce.number().int().min(1).max(1_000_000).optional(),
});
export const populationListSchema = z.object({ populations: z.array(listedPopulationSchema) });
