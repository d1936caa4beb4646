import { collaborationRoute } from '@/app/api/v1/handler';
import { starQuerySchema } from '@/lib/schemas/stars';
import { listStars } from '@/lib/services/stars';

export const GET = collaborationRoute(
  { scope: 'read', query: starQuerySchema, paged: 'stars' },
  ({ actor, query }) => listStars(actor, query),
);
