import { collaborationRoute } from '@/app/api/v1/handler';
import { getWork } from '@/lib/services/work';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => getWork(actor));
