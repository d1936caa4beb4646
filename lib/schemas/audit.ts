import { z } from 'zod';
import { moment, pageSchema } from './common';

export const auditQuerySchema = pageSchema.extend({
  action: z.string().max(60).optional(),
  item: z.string().max(100).optional(),
});
export type AuditQuery = z.infer<typeof auditQuerySchema>;

/** Who did what, when, to which thing. */
export const auditEntrySchema = z.object({
  id: z.string(),
  at: moment,
  who: z.string(),
  action: z.string(),
  itemKind: z.string(),
  itemId: z.string(),
  summary: z.string(),
  details: z.record(z.string(), z.unknown()),
});
export const auditPageSchema = z.object({ entries: z.array(auditEntrySchema), total: z.number() });
export type AuditPage = z.infer<typeof auditPageSchema>;
