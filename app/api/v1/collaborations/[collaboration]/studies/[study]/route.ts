import { collaborationRoute } from '@/app/api/v1/handler';
import { getStudy, removeStudy } from '@/lib/services/studies';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getStudy(actor, params.study),
);

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  removeStudy(actor, params.study),
);
