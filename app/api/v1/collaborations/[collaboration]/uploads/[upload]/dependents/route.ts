import { collaborationRoute } from '@/app/api/v1/handler';
import { getDependents } from '@/lib/services/upload-withdrawal';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getDependents(actor, params.upload),
);
