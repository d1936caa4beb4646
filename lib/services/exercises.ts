import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import type {
  createExerciseSchema,
  ExerciseDetail,
  ExerciseView,
  updateExerciseSchema,
} from '@/lib/schemas/exercises';
import {
  AnalysisRow,
  database,
  ExerciseRow,
  ExerciseStartRow,
  ExerciseSubmissionRow,
  inTransaction,
  PersonRow,
} from '@/models';
import { recordAudit } from './audit';
import { describeParticipants } from './exercise-participants';
import { type ExerciseRun, readExerciseRuns } from './exercise-runs';

const KEY = /^E-([1-9][0-9]{0,8})$/;

/** Whoever may set exercises reads everybody's; the others read those that are shared. */
export const readsAll = (actor: Actor) => may(actor, 'make-exercise');

/** Its last day, in UTC, is not over. */
export function isOpen({ dueOn }: Pick<ExerciseRow, 'dueOn'>, now = new Date()): boolean {
  return dueOn === null || now.toISOString().slice(0, 10) <= dueOn;
}

/** The exercise "E-2", or the same "no such exercise" for any that this person does not see. */
export async function findExercise(
  actor: Actor,
  key: string,
  transaction?: Transaction,
): Promise<ExerciseRow> {
  demand(actor, 'read');
  const number = Number(KEY.exec(key)?.[1] ?? 0);
  const { collaborationId } = actor;
  const row = await ExerciseRow.findOne({ where: { collaborationId, number }, transaction });
  if (!row || !(row.isShared || readsAll(actor))) throw new NotFound('exercise');
  return row;
}

export const runRef = ({ id, number, analysis }: ExerciseRun) => ({ id, number, analysis });

async function describeExercises(actor: Actor, rows: ExerciseRow[]): Promise<ExerciseView[]> {
  if (rows.length === 0) return [];
  const { collaborationId, personId } = actor;
  const [references, makers, starts] = await Promise.all([
    readExerciseRuns(actor, { runIds: rows.map(({ runId }) => runId) }),
    PersonRow.findAll({ where: { id: rows.flatMap(({ createdBy }) => createdBy ?? []) } }),
    ExerciseStartRow.findAll({ where: { collaborationId, exerciseId: rows.map(({ id }) => id) } }),
  ]);
  const startIds = starts.map(({ id }) => id);
  const mine = starts.filter((start) => start.personId === personId);
  const [submissions, drafts] = await Promise.all([
    ExerciseSubmissionRow.findAll({
      attributes: ['id', 'startId'],
      where: { collaborationId, startId: startIds },
    }),
    AnalysisRow.findAll({ where: { id: mine.map(({ analysisId }) => analysisId) } }),
  ]);
  const countOf = (ids: string[]) =>
    submissions.filter(({ startId }) => ids.includes(startId)).length;
  return rows.map((row) => {
    const reference = references.find(({ id }) => id === row.runId);
    if (!reference) throw new NotFound('run of the exercise');
    const begun = starts.filter(({ exerciseId }) => exerciseId === row.id);
    const own = begun.find((start) => start.personId === personId);
    const draft = drafts.find(({ id }) => id === own?.analysisId);
    const maySubmit = may(actor, 'submit-exercise') && row.isShared && isOpen(row);
    return {
      id: row.id,
      key: `E-${row.number}`,
      number: row.number,
      title: row.title,
      task: row.task,
      mayChange: row.mayChange,
      dueOn: row.dueOn,
      isOpen: isOpen(row),
      isShared: row.isShared,
      createdBy: makers.find(({ id }) => id === row.createdBy)?.name ?? null,
      createdAt: row.createdAt.toISOString(),
      reference: {
        run: runRef(reference),
        name: reference.analysisName,
        stated: reference.stated,
      },
      counts: readsAll(actor)
        ? { started: begun.length, submissions: countOf(begun.map(({ id }) => id)) }
        : null,
      own:
        own && draft
          ? {
              analysis: `A-${draft.number}`,
              startedAt: own.startedAt.toISOString(),
              submissions: countOf([own.id]),
            }
          : null,
      can: {
        change: may(actor, 'make-exercise'),
        begin: maySubmit && own === undefined,
        submit: maySubmit && own !== undefined,
      },
    };
  });
}

/** Exercises that this person may read, the newest first. */
export async function listExercises(actor: Actor): Promise<{ exercises: ExerciseView[] }> {
  demand(actor, 'read');
  const rows = await ExerciseRow.findAll({
    where: {
      collaborationId: actor.collaborationId,
      ...(readsAll(actor) ? {} : { isShared: true }),
    },
    order: [['number', 'DESC']],
  });
  return { exercises: await describeExercises(actor, rows) };
}

/** One exercise with everybody's submissions, or with the reader's own. */
export async function getExercise(actor: Actor, key: string): Promise<ExerciseDetail> {
  const row = await findExercise(actor, key);
  const [view] = await describeExercises(actor, [row]);
  const [reference] = await readExerciseRuns(actor, { runIds: [row.runId] });
  const participants = await describeParticipants(actor, row, reference, readsAll(actor));
  const own = participants.find(({ person }) => person.id === actor.personId);
  const start = await ExerciseStartRow.findOne({
    where: { exerciseId: row.id, personId: actor.personId },
  });
  const runs = start ? await readExerciseRuns(actor, { analysisIds: [start.analysisId] }) : [];
  const handedIn = new Set(own?.submissions.map(({ run }) => run.id));
  return {
    ...view,
    participants,
    ready: runs
      .filter(({ id }) => !handedIn.has(id))
      .map((run) => ({ ...runRef(run), sentence: run.stated.sentence })),
  };
}

/** Sets an exercise from a finished run. */
export async function createExercise(
  actor: Actor,
  input: z.output<typeof createExerciseSchema>,
): Promise<ExerciseView> {
  demand(actor, 'make-exercise');
  const { collaborationId, personId } = actor;
  const row = await inTransaction(async (transaction) => {
    const [reference] = await readExerciseRuns(actor, { runIds: [input.runId] }, transaction);
    if (!reference) throw new NotFound('finished run');
    // One exercise after the other gets its number.
    await database().query('select id from collaboration where id = $1 for update', {
      bind: [collaborationId],
      transaction,
    });
    const where = { collaborationId };
    const last = await ExerciseRow.max<number, ExerciseRow>('number', { where, transaction });
    const number = (last ?? 0) + 1;
    const made = await ExerciseRow.create(
      { ...input, collaborationId, number, createdBy: personId },
      { transaction },
    );
    const item = { kind: 'exercise', id: made.id };
    const words = `set the exercise E-${number} from ${reference.analysis}`;
    await recordAudit(actor, 'make-exercise', item, words, transaction);
    return made;
  });
  const [view] = await describeExercises(actor, [row]);
  return view;
}

/** Changes what an exercise says, allows or until when it is open; never the run it is held against. */
export async function updateExercise(
  actor: Actor,
  key: string,
  input: z.output<typeof updateExerciseSchema>,
): Promise<ExerciseView> {
  demand(actor, 'make-exercise');
  const row = await inTransaction(async (transaction) => {
    const found = await findExercise(actor, key, transaction);
    await found.update(input, { transaction });
    const item = { kind: 'exercise', id: found.id };
    await recordAudit(actor, 'make-exercise', item, `changed the exercise ${key}`, transaction);
    return found;
  });
  const [view] = await describeExercises(actor, [row]);
  return view;
}
