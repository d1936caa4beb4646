import { collaborationRoute } from '@/app/api/v1/handler';
import { getLeaving } from '@/lib/services/leaving/exports';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => getLeaving(actor));
