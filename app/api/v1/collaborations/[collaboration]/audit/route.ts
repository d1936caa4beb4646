import { collaborationRoute } from '@/app/api/v1/handler';
import { auditQuerySchema } from '@/lib/schemas/audit';
import { listAudit } from '@/lib/services/audit';

export const GET = collaborationRoute(
  { scope: 'read', query: auditQuerySchema, paged: 'entries' },
  ({ actor, query }) => listAudit(actor, query),
);
