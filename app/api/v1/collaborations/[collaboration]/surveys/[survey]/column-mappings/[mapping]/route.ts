import { collaborationRoute } from '@/app/api/v1/handler';
import { forgetMapping } from '@/lib/services/column-memory';

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  forgetMapping(actor, params.survey, params.mapping),
);
