import { collaborationRoute } from '@/app/api/v1/handler';
import { searchQuerySchema } from '@/lib/schemas/search';
import { search } from '@/lib/services/search';

export const GET = collaborationRoute(
  { scope: 'read', query: searchQuerySchema },
  ({ actor, query }) => search(actor, query.q),
);
