import { collaborationRoute } from '@/app/api/v1/handler';
import { getOverview } from '@/lib/services/overview';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => getOverview(actor));
