import { collaborationRoute } from '@/app/api/v1/handler';
import { createVersionSchema } from '@/lib/schemas/population-versions';
import { createPopulationVersion } from '@/lib/services/populations';

export const POST = collaborationRoute(
  { scope: 'write', body: createVersionSchema, status: 201 },
  ({ actor, params, body }) => createPopulationVersion(actor, params.population, body),
);
