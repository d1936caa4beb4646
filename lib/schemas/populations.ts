import { z } from 'zod';
import { idSchema, lineSchema, moment } from './common';
import { listedDefinitionSchema, populationDefinitionSchema } from './population-definitions';

export { isPlainPowerLaw } from './plain-power-law';
export type {
  BoxedDefinition,
  ListedDefinition,
  PopulationDefinition,
  PowerLawDefinition,
} from './population-definitions';
export {
  listedDefinitionSchema,
  populationDefinitionSchema,
} from './population-definitions';

/**
 * What the indices of a definition are stated per: m (`linear`), ln m (`log`) or log10 m, whose
 * index is the same.
 */
export const indexConventionSchema = z.enum(['linear', 'log', 'log10']);

/** The same for the semi-major axis; `period`: index of dN/d ln P, `linear-period`: of dN/dP. */
export const axisConventionSchema = z.enum(['linear', 'log', 'log10', 'period', 'linear-period']);

/** Conventions of a definition's indices: named, never guessed. */
export const statedIn = {
  convention: indexConventionSchema,
  /** Where the semi-major axis follows another convention than the mass. */
  semiMajorAxisConvention: axisConventionSchema.optional(),
};

/** As a form or a script gives it. */
export const createPopulationSchema = z.strictObject({
  name: lineSchema(100),
  note: z.string().max(2000).default(''),
  ...statedIn,
  definition: populationDefinitionSchema,
  isShared: z.boolean().default(false),
  /** Number of the population of which this is a new version. */
  versionOf: z.number().int().positive().optional(),
});
export type CreatePopulation = z.infer<typeof createPopulationSchema>;

const facts = {
  id: idSchema,
  key: z.string(),
  number: z.number(),
  version: z.number(),
  name: z.string(),
  note: z.string(),
  words: z.string(),
  digest: z.string(),
  isShared: z.boolean(),
  createdBy: z.string().nullable(),
  createdAt: moment,
  usedBy: z.array(z.string()),
  can: z.object({ saveVersion: z.boolean(), share: z.boolean() }),
};

/** One version with its whole definition. */
export const populationSchema = z.object({ ...facts, definition: populationDefinitionSchema });
export type PopulationView = z.infer<typeof populationSchema>;

/** One version as lists and analyses hold it. */
export const listedPopulationSchema = z.object({ ...facts, definition: listedDefinitionSchema });
export type ListedPopulation = z.infer<typeof listedPopulationSchema>;
