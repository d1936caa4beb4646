import { collaborationRoute } from '@/app/api/v1/handler';
import { addObservationSchema } from '@/lib/schemas/candidates';
import { addObservation } from '@/lib/services/candidates/observations';

export const POST = collaborationRoute(
  { scope: 'write', body: addObservationSchema, status: 201 },
  ({ actor, params, body }) => addObservation(actor, params.candidate, body),
);
