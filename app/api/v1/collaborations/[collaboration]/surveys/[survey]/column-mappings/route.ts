import { collaborationRoute } from '@/app/api/v1/handler';
import { listMappings } from '@/lib/services/column-memory';

export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params }) => ({
  mappings: await listMappings(actor, params.survey),
}));
