import { collaborationRoute } from '@/app/api/v1/handler';
import { createStudySchema } from '@/lib/schemas/studies';
import { listStudiesOfRun, startStudy } from '@/lib/services/studies';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  listStudiesOfRun(actor, params.run),
);

export const POST = collaborationRoute(
  { scope: 'run', body: createStudySchema, status: 201 },
  ({ actor, params, body }) => startStudy(actor, params.run, body),
);
