import { collaborationRoute } from '@/app/api/v1/handler';
import { cancelJob } from '@/lib/services/jobs';

export const POST = collaborationRoute({ scope: 'run' }, ({ actor, params }) =>
  cancelJob(actor, params.job),
);
