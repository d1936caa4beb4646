import { collaborationRoute } from '@/app/api/v1/handler';
import { readMapStore } from '@/lib/services/maps';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => readMapStore(actor));
