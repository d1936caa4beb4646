import { collaborationRoute } from '@/app/api/v1/handler';
import { retryJob } from '@/lib/services/jobs';

export const POST = collaborationRoute({ scope: 'run' }, ({ actor, params }) =>
  retryJob(actor, params.job),
);
