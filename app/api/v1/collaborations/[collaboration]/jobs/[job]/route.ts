import { collaborationRoute } from '@/app/api/v1/handler';
import { getJob } from '@/lib/services/jobs';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getJob(actor, params.job),
);
