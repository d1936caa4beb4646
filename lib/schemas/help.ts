import { z } from 'zod';

/** One entry of the help, set on the server: what a mark beside a quantity opens. */
export const helpDefinitionSchema = z.object({
  word: z.string(),
  title: z.string(),
  paragraph: z.array(z.object({ text: z.string(), html: z.string().optional() })),
  formulas: z.array(z.object({ html: z.string(), reads: z.string() })),
  units: z.string(),
  source: z.string(),
  seeAlso: z.array(z.object({ word: z.string(), title: z.string() })),
});
export type HelpDefinition = z.infer<typeof helpDefinitionSchema>;
