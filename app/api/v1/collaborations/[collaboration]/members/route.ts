import { collaborationRoute } from '@/app/api/v1/handler';
import { listMembers } from '@/lib/services/members';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listMembers(actor));
