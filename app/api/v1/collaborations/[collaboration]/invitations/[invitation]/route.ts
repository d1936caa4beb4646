import { collaborationRoute } from '@/app/api/v1/handler';
import { revokeInvitation } from '@/lib/services/invitations';

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  revokeInvitation(actor, params.invitation),
);
