import { collaborationRoute } from '@/app/api/v1/handler';
import { createSampleSchema } from '@/lib/schemas/samples';
import { createSample, listSamples } from '@/lib/services/samples';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listSamples(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createSampleSchema, status: 201 },
  ({ actor, body }) => createSample(actor, body),
);
