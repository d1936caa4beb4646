import { collaborationRoute } from '@/app/api/v1/handler';
import { updateExerciseSchema } from '@/lib/schemas/exercises';
import { getExercise, updateExercise } from '@/lib/services/exercises';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getExercise(actor, params.exercise),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: updateExerciseSchema,
    current: ({ actor, params }) => getExercise(actor, params.exercise),
  },
  ({ actor, params, body }) => updateExercise(actor, params.exercise, body),
);
