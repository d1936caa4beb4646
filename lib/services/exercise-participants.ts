import type { Actor } from '@/lib/access/actor';
import { NotFound } from '@/lib/errors';
import type { ParticipantView, SubmissionView } from '@/lib/schemas/exercises';
import {
  AnalysisRow,
  type ExerciseRow,
  ExerciseStartRow,
  ExerciseSubmissionRow,
  MemberRow,
  PersonRow,
} from '@/models';
import { type ExerciseRun, readExerciseRuns } from './exercise-runs';
import { limitDifferenceWords, recipeDifferences } from './exercise-words';

export function describeSubmission(
  row: ExerciseSubmissionRow,
  run: ExerciseRun,
  reference: ExerciseRun,
  nameOf: (personId: string | null) => string | null,
): SubmissionView {
  return {
    id: row.id,
    number: row.number,
    run: { id: run.id, number: run.number, analysis: run.analysis },
    remark: row.remark,
    submittedAt: row.submittedAt.toISOString(),
    differences: recipeDifferences(reference, run).map(({ words }) => words),
    stated: run.stated,
    difference: limitDifferenceWords(reference.stated, run.stated),
    comment: row.comment ?? null,
    commentedBy: nameOf(row.commentedBy ?? null),
    commentedAt: row.commentedAt?.toISOString() ?? null,
  };
}

/** Students of the collaboration, and whoever else began the exercise. */
async function peopleOf(
  actor: Actor,
  starts: ExerciseStartRow[],
  isEverybody: boolean,
): Promise<string[]> {
  if (!isEverybody) return starts.map(({ personId }) => personId);
  const members = await MemberRow.findAll({ where: { collaborationId: actor.collaborationId } });
  const students = members.filter(({ roles }) => roles.includes('student'));
  return [...new Set([...students, ...starts].map(({ personId }) => personId))];
}

/**
 * Who did what with an exercise.
 *
 * @param isEverybody else only what the reader did
 */
export async function describeParticipants(
  actor: Actor,
  exercise: ExerciseRow,
  reference: ExerciseRun,
  isEverybody: boolean,
): Promise<ParticipantView[]> {
  const { collaborationId, personId } = actor;
  const starts = await ExerciseStartRow.findAll({
    where: {
      collaborationId,
      exerciseId: exercise.id,
      ...(isEverybody ? {} : { personId }),
    },
  });
  const submissions = await ExerciseSubmissionRow.findAll({
    where: { collaborationId, startId: starts.map(({ id }) => id) },
    order: [['number', 'DESC']],
  });
  const ids = await peopleOf(actor, starts, isEverybody);
  const commenters = submissions.flatMap(({ commentedBy }) => commentedBy ?? []);
  const [runs, people, drafts] = await Promise.all([
    readExerciseRuns(actor, { runIds: submissions.map(({ runId }) => runId) }),
    PersonRow.findAll({ where: { id: [...ids, ...commenters] } }),
    AnalysisRow.findAll({ where: { id: starts.map(({ analysisId }) => analysisId) } }),
  ]);
  const nameOf = (id: string | null) => people.find((one) => one.id === id)?.name ?? null;
  const views = ids.map((id): ParticipantView => {
    const start = starts.find((one) => one.personId === id);
    const draft = drafts.find((one) => one.id === start?.analysisId);
    const own = submissions.filter(({ startId }) => startId === start?.id);
    return {
      person: { id, name: nameOf(id) ?? 'somebody who left' },
      state: own.length > 0 ? 'handed-in' : start ? 'begun' : 'not-begun',
      analysis: draft ? `A-${draft.number}` : null,
      startedAt: start?.startedAt.toISOString() ?? null,
      submissions: own.map((row) => {
        const run = runs.find((one) => one.id === row.runId);
        if (!run) throw new NotFound('run that was handed in');
        return describeSubmission(row, run, reference, nameOf);
      }),
    };
  });
  return views.sort((a, b) => a.person.name.localeCompare(b.person.name));
}
