import { z } from 'zod';

/** The population over which lists average detection probabilities, and the ranges that it asks for. */
export const yardstickSchema = z.object({
  /** Name, key and version of the population; null for the one that is flat in both logarithms. */
  population: z.string().nullable(),
  key: z.string().nullable(),
  version: z.number().nullable(),
  /** The lead analysis, where the population is its own. */
  analysis: z.string().nullable(),
  massMinMjup: z.number(),
  massMaxMjup: z.number(),
  semiMajorAxisMinAu: z.number(),
  semiMajorAxisMaxAu: z.number(),
});
export type YardstickView = z.infer<typeof yardstickSchema>;
