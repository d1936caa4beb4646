import { collaborationRoute } from '@/app/api/v1/handler';
import { candidateQuerySchema } from '@/lib/schemas/candidates';
import { listCandidates } from '@/lib/services/candidates/list';

export const GET = collaborationRoute(
  { scope: 'read', query: candidateQuerySchema, paged: 'candidates' },
  ({ actor, query }) => listCandidates(actor, query),
);
