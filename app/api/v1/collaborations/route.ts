import { personRoute } from '@/app/api/v1/handler';
import { createCollaborationSchema } from '@/lib/schemas/people';
import { createCollaboration, listCollaborations } from '@/lib/services/collaborations';

export const GET = personRoute({ scope: 'read' }, ({ person }) => listCollaborations(person));

export const POST = personRoute(
  { scope: 'write', sessionOnly: true, body: createCollaborationSchema, status: 201 },
  ({ person, body }) => createCollaboration(person, body),
);
