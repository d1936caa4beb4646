import { z } from 'zod';

/** A first step for a person's role; whether it is done follows from what exists. */
export const firstStepSchema = z.object({
  title: z.string(),
  detail: z.string(),
  /** Below the collaboration's address. */
  path: z.string(),
  isDone: z.boolean(),
});
export type FirstStep = z.infer<typeof firstStepSchema>;
