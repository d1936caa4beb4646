import { z } from 'zod';
import { idSchema, moment, pageSchema } from './common';

/** Which entries: each filter narrows what the others leave. */
const filters = {
  action: z.string().max(60).optional(),
  item: z.string().max(100).optional(),
  person: idSchema.optional(),
  /** From this moment on, and before that one. */
  from: moment.optional(),
  to: moment.optional(),
};
export const auditQuerySchema = pageSchema.extend(filters);
export type AuditQuery = z.infer<typeof auditQuerySchema>;
export const auditExportQuerySchema = z.strictObject({
  ...filters,
  format: z.enum(['csv', 'json']).default('csv'),
});
export type AuditExportQuery = z.infer<typeof auditExportQuerySchema>;

/** Who did what, when, from where, to which thing, and what it was before and after. */
export const auditEntrySchema = z.object({
  id: z.string(),
  at: moment,
  who: z.string(),
  personId: idSchema.nullable(),
  action: z.string(),
  itemKind: z.string(),
  itemId: z.string(),
  /** As pages name it; null for what is gone or has no page. */
  item: z.string().nullable(),
  /** Its page, below the collaboration's address. */
  path: z.string().nullable(),
  summary: z.string(),
  /** "direct" where no stated proxy tells of addresses; null for what no request did. */
  address: z.string().nullable(),
  details: z.record(z.string(), z.unknown()),
});
export type AuditEntryView = z.infer<typeof auditEntrySchema>;
export const auditPageSchema = z.object({ entries: z.array(auditEntrySchema), total: z.number() });
export type AuditPage = z.infer<typeof auditPageSchema>;
