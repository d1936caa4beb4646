import { z } from 'zod';
import { idSchema, lineSchema, moment, positiveSchema } from './common';

export const indexConventionSchema = z.enum(['linear', 'log']);

const powerLawFields = {
  form: z.literal('power-law'),
  massMinMjup: positiveSchema,
  massMaxMjup: positiveSchema,
  semiMajorAxisMinAu: positiveSchema,
  semiMajorAxisMaxAu: positiveSchema,
  massIndex: z.number().finite().min(-10).max(10),
  semiMajorAxisIndex: z.number().finite().min(-10).max(10),
};
interface Ranges {
  massMinMjup: number;
  massMaxMjup: number;
  semiMajorAxisMinAu: number;
  semiMajorAxisMaxAu: number;
}
const massInOrder = (p: Ranges) => p.massMinMjup < p.massMaxMjup;
const axisInOrder = (p: Ranges) => p.semiMajorAxisMinAu < p.semiMajorAxisMaxAu;

/** As stored: indices per natural logarithm (dN/d ln m ∝ m^massIndex). */
export const populationDefinitionSchema = z
  .strictObject(powerLawFields)
  .refine(massInOrder, { path: ['massMinMjup'], error: 'massMinMjup below massMaxMjup' })
  .refine(axisInOrder, {
    path: ['semiMajorAxisMinAu'],
    error: 'semiMajorAxisMinAu below semiMajorAxisMaxAu',
  });
export type PopulationDefinition = z.infer<typeof populationDefinitionSchema>;

/** As a form or a script gives it: the convention of the indices is named, never guessed. */
export const createPopulationSchema = z.strictObject({
  name: lineSchema(100),
  note: z.string().max(2000).default(''),
  convention: indexConventionSchema,
  definition: populationDefinitionSchema,
  isShared: z.boolean().default(false),
  /** Number of the population of which this is a new version. */
  versionOf: z.number().int().positive().optional(),
});
export type CreatePopulation = z.infer<typeof createPopulationSchema>;

export const populationSchema = z.object({
  id: idSchema,
  key: z.string(),
  number: z.number(),
  version: z.number(),
  name: z.string(),
  note: z.string(),
  definition: populationDefinitionSchema,
  words: z.string(),
  digest: z.string(),
  isShared: z.boolean(),
  createdBy: z.string().nullable(),
  createdAt: moment,
  usedBy: z.array(z.string()),
  can: z.object({ saveVersion: z.boolean(), share: z.boolean() }),
});
export type PopulationView = z.infer<typeof populationSchema>;
