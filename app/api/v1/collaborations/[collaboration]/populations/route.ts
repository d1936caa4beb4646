import { collaborationRoute } from '@/app/api/v1/handler';
import { createPopulationSchema } from '@/lib/schemas/populations';
import { createPopulation, listPopulations } from '@/lib/services/populations';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listPopulations(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createPopulationSchema, status: 201 },
  ({ actor, body }) => createPopulation(actor, body),
);
