import { collaborationRoute } from '@/app/api/v1/handler';
import { startExercise } from '@/lib/services/exercise-work';

export const POST = collaborationRoute({ scope: 'write', status: 201 }, ({ actor, params }) =>
  startExercise(actor, params.exercise),
);
