import { collaborationRoute } from '@/app/api/v1/handler';
import { leaveOutSchema } from '@/lib/schemas/surveys';
import { getTarget, markTarget } from '@/lib/services/targets';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getTarget(actor, params.target),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: leaveOutSchema,
    current: ({ actor, params }) => getTarget(actor, params.target),
  },
  ({ actor, params, body }) => markTarget(actor, params.target, body),
);
