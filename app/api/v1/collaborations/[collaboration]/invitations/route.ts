import { collaborationRoute } from '@/app/api/v1/handler';
import { inviteSchema } from '@/lib/schemas/people';
import { createInvitation, listInvitations } from '@/lib/services/invitations';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listInvitations(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: inviteSchema, status: 201, limit: 'invitations' },
  ({ actor, body }) => createInvitation(actor, body),
);
