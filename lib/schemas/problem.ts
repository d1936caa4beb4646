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

export const readColumnSchema = z.object({
  index: z.number(),
  heading: z.string(),
  readAs: z.string().nullable(),
  unit: z.string().nullable(),
});

/** What is shown of a refused file beside its faults. */
export const refusedFileSchema = z.object({
  columns: z.array(readColumnSchema),
  /** Lines at fault with the lines around them; of text files, at most 20. */
  excerpts: z.array(
    z.object({
      line: z.number(),
      before: z.string().nullable(),
      text: z.string(),
      after: z.string().nullable(),
    }),
  ),
  /** Rows at fault with their cells as written; of tables, at most 1000. */
  offending: z
    .object({
      headings: z.array(z.string()),
      rows: z.array(
        z.object({
          place: z.string(),
          cells: z.array(z.string()),
          column: z.string().nullable(),
          code: z.string(),
          found: z.string(),
          expected: z.string(),
        }),
      ),
      count: z.number(),
    })
    .nullable(),
  /** A mapping of columns that came from an earlier file with these headings. */
  remembered: z.object({ id: z.string(), columnMap: z.record(z.string(), z.string()) }).nullable(),
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
  refused: refusedFileSchema.optional(),
  needed: z.array(z.string()).optional(),
});
export type Problem = z.infer<typeof problemSchema>;
