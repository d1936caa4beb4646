import { z } from 'zod';

/** A file that something offers, as a list of them names it. */
export const exportFileSchema = z.object({
  /** Last part of its address. */
  name: z.string(),
  group: z.enum(['tables', 'maps', 'words']),
  /** Its content, for people. */
  what: z.string(),
  format: z.string(),
  audience: z.string(),
  mediaType: z.string(),
  /** Known before it is made, or null. */
  byteLength: z.number().nullable(),
});
export type ListedExport = z.infer<typeof exportFileSchema>;

export const exportListSchema = z.object({
  /** "draft, run 18", said in every file. */
  state: z.string(),
  files: z.array(exportFileSchema),
  /** What is not offered, and why. */
  missing: z.array(z.object({ name: z.string(), reason: z.string() })),
});
export type ExportList = z.infer<typeof exportListSchema>;

/** How a file is written, where there is a choice. */
export const exportQuerySchema = z.strictObject({
  /** Of a LaTeX table. */
  style: z.enum(['deluxetable', 'tabular']).optional(),
  /** Of maps: float32 unless asked. */
  precision: z.enum(['float32', 'float64']).optional(),
});

/** Of a run, whose figures have a width. */
export const runExportQuerySchema = exportQuerySchema.extend({
  /** Of the figure, mm: one column or two. */
  width: z.enum(['88', '180']).default('88'),
});
