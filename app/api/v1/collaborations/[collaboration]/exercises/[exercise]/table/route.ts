import { collaborationRoute } from '@/app/api/v1/handler';
import { exportExercise } from '@/lib/services/exercise-work';

/** Everybody's submissions, as an attachment. */
export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params }) => {
  const { fileName, text } = await exportExercise(actor, params.exercise);
  return new Response(text, {
    headers: {
      'Content-Type': 'text/csv; charset=utf-8',
      'Content-Disposition': `attachment; filename="${fileName}"`,
    },
  });
});
