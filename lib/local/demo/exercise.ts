import type { Actor } from '@/lib/access/actor';
import { createExerciseSchema } from '@/lib/schemas/exercises';
import { submitExercise } from '@/lib/services/exercise-work';
import { createExercise } from '@/lib/services/exercises';
import { AnalysisRow, ExerciseRow, ExerciseStartRow, inTransaction, RunRow } from '@/models';

const task = `The lead analysis counts the detections inside its ranges. What would the images alone have said?

1. Begin with a draft of your own and set the detections aside.
2. Run it, and compare its limit with the reference.
3. Say in the remark which of the two moves the limit more here: the detections, or the prior.`;

/** The newest finished run of an analysis. */
async function newestRun(analysisId: string): Promise<RunRow> {
  const rows = await RunRow.findAll({ where: { analysisId }, order: [['number', 'DESC']] });
  const run = rows.find(({ result }) => result !== null);
  if (!run) throw new Error('an analysis of the demonstration has no finished run');
  return run;
}

/**
 * Sets the demonstration's exercise, with the student's zero-detection run handed in: the run is
 * there already, so nothing is computed. A second time changes nothing.
 */
export async function addExercise(
  statistician: Actor,
  student: Actor,
  leadAnalysisId: string,
): Promise<void> {
  const { collaborationId } = statistician;
  if ((await ExerciseRow.count({ where: { collaborationId } })) > 0) return;
  const reference = await newestRun(leadAnalysisId);
  const draft = await AnalysisRow.findOne({
    where: { collaborationId, parentId: leadAnalysisId, createdBy: student.personId },
    order: [['number', 'ASC']],
    rejectOnEmpty: true,
  });
  const exercise = await createExercise(
    statistician,
    createExerciseSchema.parse({
      title: 'What do the detections do?',
      task,
      runId: reference.id,
      mayChange: ['detections', 'prior', 'level'],
    }),
  );
  await inTransaction((transaction) =>
    ExerciseStartRow.create(
      {
        collaborationId,
        exerciseId: exercise.id,
        personId: student.personId,
        analysisId: draft.id,
      },
      { transaction },
    ),
  );
  await submitExercise(student, exercise.key, {
    runId: (await newestRun(draft.id)).id,
    remark:
      'Setting them aside lowers the limit: with detections the small rates are no longer likely.',
  });
}
