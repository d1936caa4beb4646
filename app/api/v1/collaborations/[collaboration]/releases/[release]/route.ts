import { collaborationRoute } from '@/app/api/v1/handler';
import { updateReleaseSchema } from '@/lib/schemas/releases';
import { getRelease } from '@/lib/services/releases/describe';
import { removeRelease, updateRelease } from '@/lib/services/releases/draft';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getRelease(actor, params.release),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: updateReleaseSchema,
    current: ({ actor, params }) => getRelease(actor, params.release),
  },
  ({ actor, params, body }) => updateRelease(actor, params.release, body),
);

export const DELETE = collaborationRoute(
  { scope: 'write', current: ({ actor, params }) => getRelease(actor, params.release) },
  ({ actor, params }) => removeRelease(actor, params.release),
);
