import { collaborationRoute } from '@/app/api/v1/handler';
import { listRuns, startRun } from '@/lib/services/runs';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  listRuns(actor, params.analysis),
);

export const POST = collaborationRoute({ scope: 'run', status: 201 }, ({ actor, params }) =>
  startRun(actor, params.analysis),
);
