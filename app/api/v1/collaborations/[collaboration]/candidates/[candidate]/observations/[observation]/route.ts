import { collaborationRoute } from '@/app/api/v1/handler';
import { removeObservation } from '@/lib/services/candidates/observations';

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  removeObservation(actor, params.candidate, params.observation),
);
