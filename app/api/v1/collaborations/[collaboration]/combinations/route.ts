import { collaborationRoute } from '@/app/api/v1/handler';
import { createCombinationSchema } from '@/lib/schemas/combinations';
import { createCombination, listCombinations } from '@/lib/services/combinations';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listCombinations(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createCombinationSchema, status: 201 },
  ({ actor, body }) => createCombination(actor, body),
);
