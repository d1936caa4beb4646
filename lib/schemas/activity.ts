import { z } from 'zod';
import { idSchema, moment } from './common';

/** Kinds of news, as the filter of the page names them. */
export const activityKindSchema = z.enum([
  'surveys',
  'stars',
  'candidates',
  'analyses',
  'notes',
  'releases',
  'people',
]);
export type ActivityKind = z.infer<typeof activityKindSchema>;

export const activityQuerySchema = z.strictObject({
  kind: activityKindSchema.optional(),
  person: idSchema.optional(),
  /** Id of one thing, as the entries name it. */
  item: z.string().min(1).max(100).optional(),
  /** `me`: what names the person, concerns what is theirs, or asks something of them. */
  for: z.literal('me').optional(),
  /** Of the answer before: goes on after its last entry. */
  cursor: z
    .string()
    .regex(/^[A-Za-z0-9_-]{1,200}$/, 'a cursor of an earlier answer')
    .optional(),
  limit: z.coerce.number().int().min(1).max(100).default(40),
});
export type ActivityQuery = z.infer<typeof activityQuerySchema>;

export const activityEntrySchema = z.object({
  id: z.string(),
  at: moment,
  /** Null for what the laboratory did by itself. */
  person: z.object({ id: idSchema.nullable(), name: z.string() }).nullable(),
  kind: activityKindSchema,
  /** Completes the name, such as "stored curves.csv: 12 curves"; alone, it is a sentence. */
  what: z.string(),
  item: z.object({ id: z.string(), label: z.string(), path: z.string().nullable() }).nullable(),
  /** First words of a note that still stands. */
  excerpt: z.string().nullable(),
});
export type ActivityEntry = z.infer<typeof activityEntrySchema>;
export const activityPageSchema = z.object({
  entries: z.array(activityEntrySchema),
  /** Null at the end. */
  next: z.string().nullable(),
});
export type ActivityPage = z.infer<typeof activityPageSchema>;
