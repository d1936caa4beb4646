import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, InputError, NotFound } from '@/lib/errors';
import { addFormulaGuard, writeCsv } from '@/lib/formats';
import { idSchema } from '@/lib/schemas/common';
import {
  type commentSubmissionSchema,
  partNames,
  type SubmissionView,
  type submitExerciseSchema,
} from '@/lib/schemas/exercises';
import {
  AnalysisRow,
  type ExerciseRow,
  ExerciseStartRow,
  ExerciseSubmissionRow,
  inTransaction,
  PersonRow,
} from '@/models';
import { addAnalysisIn } from './analyses';
import { recordAudit } from './audit';
import { describeSubmission } from './exercise-participants';
import { readExerciseRuns } from './exercise-runs';
import { recipeDifferences } from './exercise-words';
import { findExercise, getExercise, isOpen } from './exercises';

function refuseClosed(row: ExerciseRow, key: string): void {
  if (!row.isShared) throw new Conflict(`${key} is not shared yet: nobody can begin it`);
  if (!isOpen(row)) {
    throw new Conflict(`${key} was due on ${row.dueOn}. Whoever set it can give it a later day`);
  }
}

/** Begins an exercise: a draft of one's own that asks what the reference asks. */
export async function startExercise(actor: Actor, key: string): Promise<{ analysis: string }> {
  demand(actor, 'submit-exercise');
  const exercise = await findExercise(actor, key);
  refuseClosed(exercise, key);
  const { collaborationId, personId } = actor;
  const begun = { exerciseId: exercise.id, personId };
  return inTransaction(async (transaction) => {
    // Two presses of one button begin it once: the second waits for the row and then finds a start.
    await exercise.reload({ transaction, lock: transaction.LOCK.UPDATE });
    if (await ExerciseStartRow.findOne({ where: begun, transaction })) {
      throw new Conflict(`You began ${key} already: go on with your draft`);
    }
    const [reference] = await readExerciseRuns(actor, { runIds: [exercise.runId] }, transaction);
    const parent = reference && (await AnalysisRow.findByPk(reference.analysisId, { transaction }));
    if (!reference || !parent) throw new NotFound('run of the exercise');
    const name = `${exercise.title.slice(0, 60)}, ${actor.personName.slice(0, 50)}`;
    // The analysis may have moved on since the run: the draft asks what the run asked.
    const { recipe } = reference;
    const draft = await addAnalysisIn(actor, { name, recipe, parent }, transaction);
    await ExerciseStartRow.create(
      { ...begun, collaborationId, analysisId: draft.id },
      { transaction },
    );
    const item = { kind: 'exercise', id: exercise.id };
    const words = `began the exercise ${key} with A-${draft.number}`;
    await recordAudit(actor, 'submit-exercise', item, words, transaction);
    return { analysis: `A-${draft.number}` };
  });
}

/** Hands in a finished run of one's draft; handing in again is a new submission. */
export async function submitExercise(
  actor: Actor,
  key: string,
  { runId, remark }: z.output<typeof submitExerciseSchema>,
): Promise<SubmissionView> {
  demand(actor, 'submit-exercise');
  const { collaborationId, personId } = actor;
  return inTransaction(async (transaction) => {
    const exercise = await findExercise(actor, key, transaction);
    refuseClosed(exercise, key);
    const start = await ExerciseStartRow.findOne({
      where: { exerciseId: exercise.id, personId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!start) throw new Conflict(`Begin ${key} first: a run of your own draft is handed in`);
    const runs = await readExerciseRuns(actor, { runIds: [runId, exercise.runId] }, transaction);
    const run = runs.find(({ id }) => id === runId);
    const reference = runs.find(({ id }) => id === exercise.runId);
    if (!run || !reference || run.analysisId !== start.analysisId) {
      throw new NotFound('finished run of your draft');
    }
    const forbidden = recipeDifferences(reference, run).filter(
      ({ part }) => !exercise.mayChange.includes(part),
    );
    if (forbidden.length > 0) {
      throw new InputError({
        code: 'not-open',
        column: 'runId',
        found: forbidden.map(({ words }) => words).join('; '),
        expected: `changes of ${exercise.mayChange.map((part) => partNames[part]).join('; ')} only`,
      });
    }
    const where = { startId: start.id };
    if (await ExerciseSubmissionRow.findOne({ where: { ...where, runId }, transaction })) {
      throw new Conflict(`Run ${run.number} was handed in already: make another run first`);
    }
    const last = await ExerciseSubmissionRow.max<number, ExerciseSubmissionRow>('number', {
      where,
      transaction,
    });
    const row = await ExerciseSubmissionRow.create(
      { ...where, collaborationId, number: (last ?? 0) + 1, runId, remark },
      { transaction },
    );
    const item = { kind: 'exercise', id: exercise.id };
    const words = `handed in run ${run.number} of ${run.analysis} for ${key}`;
    await recordAudit(actor, 'submit-exercise', item, words, transaction);
    return describeSubmission(row, run, reference, () => null);
  });
}

/** One submission, for whoever may answer it. */
export async function getSubmission(
  actor: Actor,
  key: string,
  submissionId: string,
): Promise<SubmissionView> {
  demand(actor, 'make-exercise');
  const { participants } = await getExercise(actor, key);
  const all = participants.flatMap(({ submissions }) => submissions);
  const found = all.find(({ id }) => id === submissionId);
  if (!found) throw new NotFound('submission');
  return found;
}

/** Answers a submission; a comment may be written anew, what was handed in may not. */
export async function commentSubmission(
  actor: Actor,
  key: string,
  submissionId: string,
  { comment }: z.output<typeof commentSubmissionSchema>,
): Promise<SubmissionView> {
  demand(actor, 'make-exercise');
  const { collaborationId, personId } = actor;
  return inTransaction(async (transaction) => {
    const exercise = await findExercise(actor, key, transaction);
    const row = idSchema.safeParse(submissionId).success
      ? await ExerciseSubmissionRow.findOne({
          where: { id: submissionId, collaborationId },
          transaction,
        })
      : null;
    const start = row && (await ExerciseStartRow.findByPk(row.startId, { transaction }));
    if (!row || start?.exerciseId !== exercise.id) throw new NotFound('submission');
    await row.update({ comment, commentedBy: personId, commentedAt: new Date() }, { transaction });
    const runs = await readExerciseRuns(
      actor,
      { runIds: [row.runId, exercise.runId] },
      transaction,
    );
    const run = runs.find(({ id }) => id === row.runId);
    const reference = runs.find(({ id }) => id === exercise.runId);
    if (!run || !reference) throw new NotFound('run that was handed in');
    const item = { kind: 'exercise', id: exercise.id };
    await recordAudit(actor, 'make-exercise', item, `commented on ${key}`, transaction);
    const author = await PersonRow.findByPk(personId, { transaction });
    return describeSubmission(row, run, reference, () => author?.name ?? null);
  });
}

/**
 * Everybody's submissions, one a row, for whoever sets exercises.
 *
 * @throws AccessError for anybody who may not
 */
export async function exportExercise(
  actor: Actor,
  key: string,
): Promise<{ fileName: string; text: string }> {
  demand(actor, 'make-exercise');
  const { participants, reference } = await getExercise(actor, key);
  type Participant = (typeof participants)[number];
  interface Entry {
    participant: Participant;
    submission: Participant['submissions'][number] | null;
  }
  const rows = participants.flatMap((participant): Entry[] =>
    participant.submissions.length === 0
      ? [{ participant, submission: null }]
      : participant.submissions.map((submission) => ({ participant, submission })),
  );
  const column = (name: string, value: (row: Entry) => string | number | null) => ({
    name,
    values: rows.map((row) => {
      const cell = value(row);
      return typeof cell === 'string' ? addFormulaGuard(cell) : cell;
    }),
  });
  const text = writeCsv([
    column('person', ({ participant }) => participant.person.name),
    column('state', ({ participant }) => participant.state),
    column('started_at', ({ participant }) => participant.startedAt),
    column('submission', ({ submission }) => submission?.number ?? null),
    column('submitted_at', ({ submission }) => submission?.submittedAt ?? null),
    column('analysis', ({ submission }) => submission?.run.analysis ?? null),
    column('run', ({ submission }) => submission?.run.number ?? null),
    column('recipe_differences', ({ submission }) => submission?.differences.join('; ') ?? null),
    column('quantity', ({ submission }) => submission?.stated.quantity ?? null),
    column('credible_level', ({ submission }) => submission?.stated.credibleLevel ?? null),
    column('upper_limit', ({ submission }) => submission?.stated.limit ?? null),
    column('statement', ({ submission }) => submission?.stated.sentence ?? null),
    column('conditions', ({ submission }) => submission?.stated.conditions.join('; ') ?? null),
    column('reference_limit', () => reference.stated.limit),
    column('difference', ({ submission }) => submission?.difference ?? null),
    column('remark', ({ submission }) => submission?.remark ?? null),
    column('comment', ({ submission }) => submission?.comment ?? null),
  ]);
  return { fileName: `${key}-submissions.csv`, text };
}
