import { collaborationRoute } from '@/app/api/v1/handler';
import { listShares } from '@/lib/services/sharing/shares';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listShares(actor));
