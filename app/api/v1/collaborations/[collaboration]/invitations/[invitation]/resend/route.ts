import { collaborationRoute } from '@/app/api/v1/handler';
import { resendInvitation } from '@/lib/services/invitations';

export const POST = collaborationRoute(
  { scope: 'write', limit: 'invitations' },
  ({ actor, params }) => resendInvitation(actor, params.invitation),
);
