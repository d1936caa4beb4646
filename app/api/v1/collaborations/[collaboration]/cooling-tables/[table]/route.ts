import { collaborationRoute } from '@/app/api/v1/handler';
import { nameStartSchema } from '@/lib/schemas/cooling';
import { getCoolingRelation, nameStart } from '@/lib/services/cooling-relations';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getCoolingRelation(actor, params.table),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: nameStartSchema,
    current: ({ actor, params }) => getCoolingRelation(actor, params.table),
  },
  ({ actor, params, body }) => nameStart(actor, params.table, body),
);
