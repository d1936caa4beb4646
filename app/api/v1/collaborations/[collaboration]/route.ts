import { collaborationRoute } from '@/app/api/v1/handler';
import { updateCollaborationSchema } from '@/lib/schemas/account';
import { getCollaboration, updateCollaboration } from '@/lib/services/collaborations';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => getCollaboration(actor));

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: updateCollaborationSchema,
    current: ({ actor }) => getCollaboration(actor),
  },
  ({ actor, body }) => updateCollaboration(actor, body),
);
