import { collaborationRoute } from '@/app/api/v1/handler';
import { submitExerciseSchema } from '@/lib/schemas/exercises';
import { submitExercise } from '@/lib/services/exercise-work';

export const POST = collaborationRoute(
  { scope: 'write', body: submitExerciseSchema, status: 201 },
  ({ actor, params, body }) => submitExercise(actor, params.exercise, body),
);
