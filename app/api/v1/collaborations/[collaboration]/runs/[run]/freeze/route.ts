import { collaborationRoute } from '@/app/api/v1/handler';
import { freezeRunSchema } from '@/lib/schemas/releases';
import { freezeRun, getFreezeStanding } from '@/lib/services/releases/freeze';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getFreezeStanding(actor, params.run),
);

export const POST = collaborationRoute(
  { scope: 'write', body: freezeRunSchema, status: 201 },
  ({ actor, params, body }) => freezeRun(actor, params.run, body),
);
