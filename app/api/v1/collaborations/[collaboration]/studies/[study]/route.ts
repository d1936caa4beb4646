import { collaborationRoute } from '@/app/api/v1/handler';
import { getStudy, removeStudy } from '@/lib/services/studies';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getStudy(actor, params.study),
);

export const DELETE = collaborationRoute(
  { scope: 'write', current: ({ actor, params }) => getStudy(actor, params.study) },
  ({ actor, params }) => removeStudy(actor, params.study),
);
