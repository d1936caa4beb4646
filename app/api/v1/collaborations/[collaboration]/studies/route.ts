import { collaborationRoute } from '@/app/api/v1/handler';
import { studyQuerySchema } from '@/lib/schemas/studies';
import { listStudies } from '@/lib/services/studies';

export const GET = collaborationRoute(
  { scope: 'read', query: studyQuerySchema, paged: 'studies' },
  ({ actor, query }) => listStudies(actor, query),
);
