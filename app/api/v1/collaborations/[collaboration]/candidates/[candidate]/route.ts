import { collaborationRoute } from '@/app/api/v1/handler';
import { getCandidate } from '@/lib/services/candidates/detail';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getCandidate(actor, params.candidate),
);
