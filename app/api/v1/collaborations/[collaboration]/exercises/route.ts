import { collaborationRoute } from '@/app/api/v1/handler';
import { createExerciseSchema } from '@/lib/schemas/exercises';
import { createExercise, listExercises } from '@/lib/services/exercises';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listExercises(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createExerciseSchema, status: 201 },
  ({ actor, body }) => createExercise(actor, body),
);
