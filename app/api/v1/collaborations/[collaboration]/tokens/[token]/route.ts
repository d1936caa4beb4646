import { collaborationRoute } from '@/app/api/v1/handler';
import { revokeToken } from '@/lib/services/tokens';

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  revokeToken(actor, params.token),
);
