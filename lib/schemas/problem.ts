import { z } from 'zod';

export const faultSchema = z.object({
  code: z.string(),
  file: z.string().optional(),
  line: z.number().optional(),
  column: z.string().optional(),
  row: z.number().optional(),
  item: z.string().optional(),
  found: z.string().optional(),
  expected: z.string().optional(),
  hint: z.string().optional(),
  message: z.string().optional(),
});

/** The answer to a refused request: a problem document after RFC 9457, with the places of all faults. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number(),
  code: z.string(),
  detail: z.string(),
  errors: z.array(faultSchema).optional(),
  errorCount: z.number().optional(),
  needed: z.array(z.string()).optional(),
});
export type Problem = z.infer<typeof problemSchema>;
