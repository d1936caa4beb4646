import { collaborationRoute } from '@/app/api/v1/handler';
import { getRun } from '@/lib/services/runs';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getRun(actor, params.run),
);
