import { Op, QueryTypes, type Transaction, type WhereOptions } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound, TooMany } from '@/lib/errors';
import { enqueueStudy } from '@/lib/queue/enqueue';
import { idSchema } from '@/lib/schemas/common';
import { AGE_SHIFTS } from '@/lib/schemas/stack-choices';
import type {
  AgesCoolingAnswer,
  StudyMapsQuery,
  StudyQuery,
  StudySummary,
  StudyView,
} from '@/lib/schemas/studies';
import type { StudySettings } from '@/lib/schemas/study-settings';
import { ENGINE_VERSION } from '@/lib/sensitivity';
import { AnalysisRow, database, inTransaction, JobRow, RunRow, StudyRow } from '@/models';
import { digestOf } from '@/models/digest';
import { recordAudit } from './audit';
import { behindRow, type PageAsked } from './behind-row';
import { findRun, type RunMaps, readStack } from './runs';
import { refuseUnanswerable } from './study-checks';
import { hasEnded, type Summarised, shownTo, summarise } from './study-summaries';
import { studyNames } from './study-words';
import { together } from './together';

/** Further questions that one person may have waiting or running. */
const MOST_QUEUED = 20;
const QUEUE_RETRY_S = 30;
/** Hexadecimal digits of a seed. */
const SEED_LENGTH = 16;
/** Columns that only the view of one study needs are not read for lists. */
const LISTED = { exclude: ['inputs', 'result'] };

export async function listStudiesOfRun(
  actor: Actor,
  runId: string,
): Promise<{ studies: StudySummary[] }> {
  const run = await findRun(actor, runId);
  const rows = await StudyRow.findAll({
    attributes: LISTED,
    where: { runId: run.id },
    order: [['number', 'DESC']],
  });
  return { studies: (await summarise(rows)).map((one) => shownTo(actor, one)) };
}

const NEWEST = {
  table: 'study',
  keys: (row: string) => [`${row}.created_at`, `${row}.id`],
  direction: 'down',
} as const;

type StudiesAsked = StudyQuery & PageAsked;

export async function listStudies(
  actor: Actor,
  query: StudiesAsked,
): Promise<{ studies: StudySummary[] }> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const asked = JSON.stringify(query);
  const studies = await together(`studies ${collaborationId} ${asked}`, () =>
    readStudies(collaborationId, query),
  );
  return { studies: studies.map((one) => shownTo(actor, one)) };
}

async function readStudies(
  collaborationId: string,
  { kind, limit, offset, after }: StudiesAsked,
): Promise<Summarised[]> {
  const where: WhereOptions = {
    collaborationId,
    ...(kind && { kind }),
    ...(after && { [Op.and]: await behindRow(NEWEST, { name: 'study', collaborationId, after }) }),
  };
  const rows = await StudyRow.findAll({
    attributes: LISTED,
    where,
    order: [
      ['createdAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit,
    offset,
  });
  return summarise(rows);
}

/** A study of this collaboration, or the same "no such question" for absent and foreign. */
async function findStudy(actor: Actor, id: string): Promise<StudyRow> {
  demand(actor, 'read');
  const isId = idSchema.safeParse(id).success;
  const study = isId
    ? await StudyRow.findOne({ where: { id, collaborationId: actor.collaborationId } })
    : null;
  if (!study) throw new NotFound('further question');
  return study;
}

export async function getStudy(actor: Actor, id: string): Promise<StudyView> {
  const study = await findStudy(actor, id);
  const [summary] = await summarise([study]);
  if (!summary) throw new NotFound('further question');
  const { recipe } = await RunRow.findByPk(study.runId, {
    attributes: ['recipe'],
    rejectOnEmpty: true,
  });
  return {
    ...shownTo(actor, summary),
    quantity: recipe.likelihood === 'host-fraction' ? 'host_fraction' : 'companions_per_star',
    credibleLevel: recipe.credibleLevel,
    seed: study.seed,
    engineVersion: study.engineVersion,
    inputs: study.inputs,
    inputsDigest: study.inputsDigest,
    result: study.result,
    resultDigest: study.resultDigest,
  };
}

/** The newest answer of a run about ages and cooling; null while there is none. */
export async function findAgesCooling(
  actor: Actor,
  runId: string,
): Promise<AgesCoolingAnswer | null> {
  demand(actor, 'read');
  const study = await StudyRow.findOne({
    attributes: ['id', 'result'],
    where: {
      ...{ runId, collaborationId: actor.collaborationId, kind: 'ages-cooling' },
      result: { [Op.not]: null },
    },
    order: [['number', 'DESC']],
  });
  if (study?.result?.kind !== 'ages-cooling') return null;
  return { id: study.id, result: study.result };
}

/**
 * Maps of the run's stars under an age shift and a cooling model, kept with an answer about both.
 *
 * @throws NotFound for another kind of answer, and where such maps were not made
 */
export async function getStudyMaps(
  actor: Actor,
  id: string,
  { cooling, age }: StudyMapsQuery,
): Promise<RunMaps> {
  const study = await findStudy(actor, id);
  const { result, resultDigest } = study;
  const model =
    result?.kind === 'ages-cooling'
      ? result.models.findIndex((one) => one.model === cooling)
      : undefined;
  if (model === undefined || resultDigest === null) throw new NotFound('maps of this question');
  const stack = model * AGE_SHIFTS.length + AGE_SHIFTS.indexOf(age);
  const rows = await database().query<{ mapId: string }>(
    'select map_id as "mapId" from study_map where study_id = $1 and stack = $2 order by position',
    { bind: [study.id, stack], type: QueryTypes.SELECT },
  );
  if (model < 0 || rows.length === 0) throw new NotFound('maps for this age and cooling model');
  const { inputs } = await RunRow.findByPk(study.runId, {
    attributes: ['inputs'],
    rejectOnEmpty: true,
  });
  if (!inputs) throw new NotFound('run with its stars');
  const mapIds = rows.map(({ mapId }) => mapId);
  const maps = await readStack(actor.collaborationId, inputs, mapIds);
  return { ...maps, digest: `${resultDigest}-${stack}` };
}

async function refuseCrowd(actor: Actor, transaction: Transaction): Promise<void> {
  const queued = await JobRow.count({
    where: {
      requestedBy: actor.personId,
      kind: 'compute-study',
      status: ['waiting', 'running'],
    },
    transaction,
  });
  if (queued < MOST_QUEUED) return;
  const message = `You have ${queued} further questions on their way; ${MOST_QUEUED} are the most. Wait for one to end`;
  throw new TooMany(message, QUEUE_RETRY_S);
}

/** The study that answers these settings already, or will. */
async function findEqual(
  runId: string,
  settingsDigest: string,
  transaction: Transaction,
): Promise<StudyRow | null> {
  const equal = await StudyRow.findAll({
    attributes: LISTED,
    where: { runId, settingsDigest, engineVersion: ENGINE_VERSION },
    order: [['number', 'DESC']],
    transaction,
  });
  const jobs = await JobRow.findAll({
    attributes: ['id'],
    where: {
      id: equal.map(({ jobId }) => jobId),
      status: { [Op.notIn]: ['failed', 'cancelled'] },
    },
    transaction,
  });
  const live = new Set(jobs.map(({ id }) => id));
  return equal.find(({ jobId }) => live.has(jobId)) ?? null;
}

/** The run's numbers and the question: the same question draws the same random numbers. */
function seedOf(run: RunRow, settings: StudySettings): string {
  if (settings.kind === 'calibration' && settings.seed !== undefined) return settings.seed;
  return digestOf({ run: run.resultDigest, settings }).slice(0, SEED_LENGTH);
}

/**
 * Queues a further question of a finished run; row and job are made together or not at all. Settings
 * that were asked before give the study that is there, unless it failed or was stopped.
 */
export async function startStudy(
  actor: Actor,
  runId: string,
  settings: StudySettings,
): Promise<StudySummary> {
  const run = await findRun(actor, runId);
  const analysis = await AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true });
  // A forecast changes nothing of the analysis: everybody may make one of their own.
  const isOwn = settings.kind === 'forecast' || analysis.createdBy === actor.personId;
  demand(actor, 'run-analysis', { isOwn });
  const study = await inTransaction(async (transaction) => {
    // One question after the other gets its number, and equal ones find each other.
    await run.reload({ transaction, lock: transaction.LOCK.UPDATE });
    if (!run.result) throw new Conflict('The run has no result yet: wait until it has ended');
    const settingsDigest = digestOf(settings);
    const equal = await findEqual(run.id, settingsDigest, transaction);
    if (equal) return equal;
    await refuseCrowd(actor, transaction);
    await refuseUnanswerable(run, settings, transaction);
    const { collaborationId } = actor;
    const where = { runId: run.id };
    const last = await StudyRow.max<number, StudyRow>('number', { where, transaction });
    const asked = { collaborationId, requestedBy: actor.personId };
    const row = await StudyRow.create(
      {
        collaborationId,
        runId: run.id,
        number: (last ?? 0) + 1,
        jobId: await enqueueStudy(transaction, asked),
        kind: settings.kind,
        settings,
        settingsDigest,
        seed: seedOf(run, settings),
        engineVersion: ENGINE_VERSION,
        createdBy: actor.personId,
      },
      { transaction },
    );
    const summary = `asked "${studyNames[settings.kind]}" of A-${analysis.number}, run ${run.number}`;
    await recordAudit(actor, 'run-analysis', { kind: 'study', id: row.id }, summary, transaction);
    return row;
  });
  const [summary] = await summarise([study]);
  if (!summary) throw new NotFound('further question');
  return shownTo(actor, summary);
}

/** Deletes a study and its job; one that is being computed is stopped first, by its own verb. */
export async function removeStudy(actor: Actor, id: string): Promise<void> {
  const study = await findStudy(actor, id);
  demand(actor, 'run-analysis', { isOwn: study.createdBy === actor.personId });
  await inTransaction(async (transaction) => {
    const job = await JobRow.findByPk(study.jobId, {
      transaction,
      lock: transaction.LOCK.UPDATE,
      rejectOnEmpty: true,
    });
    if (!hasEnded(job.status)) {
      throw new Conflict('It is still being computed: stop it before you delete it');
    }
    await study.destroy({ transaction });
    await job.destroy({ transaction });
    const summary = `deleted "${studyNames[study.kind]}"`;
    await recordAudit(actor, 'run-analysis', { kind: 'study', id }, summary, transaction);
  });
}
