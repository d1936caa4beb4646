import { collaborationRoute } from '@/app/api/v1/handler';
import { activityQuerySchema } from '@/lib/schemas/activity';
import { listActivity } from '@/lib/services/activity';

export const GET = collaborationRoute(
  { scope: 'read', query: activityQuerySchema },
  ({ actor, query }) => listActivity(actor, query),
);
