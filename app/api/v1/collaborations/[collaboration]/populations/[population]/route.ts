import { collaborationRoute } from '@/app/api/v1/handler';
import {
  populationVersionQuerySchema,
  sharePopulationSchema,
} from '@/lib/schemas/population-versions';
import { getPopulation, sharePopulation } from '@/lib/services/populations';

export const GET = collaborationRoute(
  { scope: 'read', query: populationVersionQuerySchema },
  ({ actor, params, query }) => getPopulation(actor, params.population, query.version),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    query: populationVersionQuerySchema,
    body: sharePopulationSchema,
    current: ({ actor, params, query }) => getPopulation(actor, params.population, query.version),
  },
  ({ actor, params, query, body }) =>
    sharePopulation(actor, params.population, query.version, body),
);
