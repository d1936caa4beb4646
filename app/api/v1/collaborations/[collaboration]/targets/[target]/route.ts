import { collaborationRoute } from '@/app/api/v1/handler';
import { leaveOutSchema } from '@/lib/schemas/surveys';
import { getTarget, leaveTargetOut } from '@/lib/services/targets';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getTarget(actor, params.target),
);

export const PATCH = collaborationRoute(
  { scope: 'write', body: leaveOutSchema },
  ({ actor, params, body }) => leaveTargetOut(actor, params.target, body.leftOutReason),
);
