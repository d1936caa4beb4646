import { collaborationRoute } from '@/app/api/v1/handler';
import { getStar } from '@/lib/services/stars';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getStar(actor, params.star),
);
