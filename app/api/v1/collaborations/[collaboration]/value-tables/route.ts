import { collaborationRoute } from '@/app/api/v1/handler';
import { adoptManySchema } from '@/lib/schemas/stars';
import { adoptValues, listValueTables } from '@/lib/services/star-values';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listValueTables(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: adoptManySchema, status: 201 },
  async ({ actor, body }) => {
    await adoptValues(actor, body);
    return listValueTables(actor);
  },
);
