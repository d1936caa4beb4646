import { collaborationRoute } from '@/app/api/v1/handler';
import { listValueTables } from '@/lib/services/star-values';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listValueTables(actor));
