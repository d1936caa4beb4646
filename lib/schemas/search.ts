import { z } from 'zod';

export const searchKindSchema = z.enum([
  'survey',
  'star',
  'target',
  'population',
  'analysis',
  'run',
  'forecast',
  'candidate',
]);
export type SearchKind = z.infer<typeof searchKindSchema>;

/** Most answers of one kind: who looks for one thing does not read lists. */
export const MOST_OF_A_KIND = 5;

export const searchQuerySchema = z.strictObject({
  q: z.string().trim().min(1, 'something to look for').max(100, 'at most 100 characters'),
});

export const searchHitSchema = z.object({
  kind: searchKindSchema,
  id: z.string(),
  title: z.string(),
  /** What tells it from others of the same name. */
  note: z.string(),
  /** Its page, below the collaboration's own. */
  page: z.string(),
});
export type SearchHit = z.infer<typeof searchHitSchema>;

export const searchAnswerSchema = z.object({ hits: z.array(searchHitSchema) });
