import { z } from 'zod';
import { idSchema } from './common';

/** Initial entropy of the companions that a cooling relation follows. */
export const startConditionSchema = z.enum(['hot', 'warm', 'cold', 'unstated']);
export type StartCondition = z.infer<typeof startConditionSchema>;

export const nameStartSchema = z.strictObject({ startCondition: startConditionSchema });

/** A cooling relation with its numbers: a stored table, or the law that is built in. */
export const coolingRelationSchema = z.object({
  /** `built-in`, or the id of a table. */
  id: z.union([z.literal('built-in'), idSchema]),
  name: z.string(),
  startCondition: startConditionSchema,
  isApproximate: z.boolean(),
  source: z.string().nullable(),
  massMjup: z.array(z.number()),
  ageMyr: z.array(z.number()),
  /** Absolute magnitude by band, shape [mass, age] flat; null where there is none. */
  magnitudes: z.record(z.string(), z.array(z.number().nullable())),
  usedBy: z.array(
    z.object({
      slug: z.string(),
      name: z.string(),
      targets: z.number(),
      /** Targets with a curve whose age reaches beyond the relation: [Myr]. */
      outside: z.array(z.object({ name: z.string(), lowerMyr: z.number(), upperMyr: z.number() })),
    }),
  ),
});
export type CoolingRelationView = z.infer<typeof coolingRelationSchema>;
