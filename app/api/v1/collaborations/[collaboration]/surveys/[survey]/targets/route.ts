import { collaborationRoute } from '@/app/api/v1/handler';
import { pageSchema } from '@/lib/schemas/common';
import { listTargets } from '@/lib/services/targets';

export const GET = collaborationRoute(
  { scope: 'read', query: pageSchema, paged: 'targets' },
  ({ actor, params, query }) => listTargets(actor, params.survey, query),
);
