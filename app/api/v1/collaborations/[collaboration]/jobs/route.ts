import { collaborationRoute } from '@/app/api/v1/handler';
import { pageSchema } from '@/lib/schemas/common';
import { listJobs } from '@/lib/services/jobs';

export const GET = collaborationRoute(
  { scope: 'read', query: pageSchema, paged: 'jobs', movingOrder: true },
  ({ actor, query }) => listJobs(actor, query),
);
