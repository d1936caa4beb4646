import { QueryTypes, type Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { InputError, NotFound, TooMany } from '@/lib/errors';
import { populationBox } from '@/lib/population';
import { enqueueRun } from '@/lib/queue/enqueue';
import { findEdgeOutside, findEmptySelection, type MapReach } from '@/lib/queue/preconditions';
import { refuseUndecidedIn } from '@/lib/queue/undecided-pairs';
import { refuseWithdrawn } from '@/lib/queue/withdrawn-surveys';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { idSchema } from '@/lib/schemas/common';
import type { RunInputs, RunSummary, RunView } from '@/lib/schemas/runs';
import { ENGINE_VERSION } from '@/lib/sensitivity';
import { AnalysisRow, database, inTransaction, JobRow, PopulationRow, RunRow } from '@/models';
import { digestOf } from '@/models/digest';
import { valuesOnGrid } from '@/models/map-on-grid';
import { MissingMap, streamMaps } from '@/models/map-stream';
import { ownBytes } from '@/models/map-values';
import { findAnalysis } from './analysis-lookup';
import { recordAudit } from './audit';
import { describeJobs } from './jobs';
import { readRunFacts } from './run-facts';

/** Runs that one person may have waiting or running. */
const MOST_QUEUED = 20;
const QUEUE_RETRY_S = 30;
/** Hexadecimal digits of a seed. */
const SEED_LENGTH = 16;

/** Runs of analyses, newest first, each with the numbers that lists show. */
export async function summariseRuns(analysisIds: string[]): Promise<Map<string, RunSummary[]>> {
  const before = await readRunFacts(analysisIds);
  const jobs = await JobRow.findAll({ where: { id: before.map(({ jobId }) => jobId) } });
  const done = new Set(jobs.filter(({ status }) => status === 'done').map(({ id }) => id));
  // One that ended between the two questions would be done without a result, and stay so on screen.
  const hasEnded = before.some(({ jobId, finishedAt }) => finishedAt === null && done.has(jobId));
  const facts = hasEnded ? await readRunFacts(analysisIds) : before;
  const views = new Map((await describeJobs(jobs)).map((view) => [view.id, view]));
  const summaries = new Map<string, RunSummary[]>(analysisIds.map((id) => [id, []]));
  for (const { analysisId, jobId, ...fact } of facts) {
    const job = views.get(jobId);
    if (job) summaries.get(analysisId)?.push({ ...fact, job });
  }
  return summaries;
}

export async function listRuns(actor: Actor, key: string): Promise<{ runs: RunSummary[] }> {
  const analysis = await findAnalysis(actor, key);
  const summaries = await summariseRuns([analysis.id]);
  return { runs: summaries.get(analysis.id) ?? [] };
}

/** A run of this collaboration, or the same "no such run" for absent and foreign. */
export async function findRun(actor: Actor, id: string): Promise<RunRow> {
  demand(actor, 'read');
  const isId = idSchema.safeParse(id).success;
  const run = isId
    ? await RunRow.findOne({ where: { id, collaborationId: actor.collaborationId } })
    : null;
  if (!run) throw new NotFound('run');
  return run;
}

/** What is told of a run beside its summary, without what it rests on and what came out. */
export async function findRunRecord(
  actor: Actor,
  id: string,
): Promise<Pick<RunView, 'recipe' | 'seed' | 'engineVersion' | 'inputsDigest'>> {
  demand(actor, 'read');
  const run = await RunRow.findOne({
    attributes: ['recipe', 'seed', 'engineVersion', 'inputsDigest'],
    where: { id, collaborationId: actor.collaborationId },
    raw: true,
  });
  if (!run) throw new NotFound('run');
  return run;
}

export async function getRun(actor: Actor, id: string): Promise<RunView> {
  const run = await findRun(actor, id);
  const analysis = await AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true });
  const summaries = await summariseRuns([analysis.id]);
  const summary = summaries.get(analysis.id)?.find((one) => one.id === run.id);
  if (!summary) throw new NotFound('run');
  return {
    ...summary,
    analysis: { id: analysis.id, key: `A-${analysis.number}`, name: analysis.name },
    recipe: run.recipe,
    seed: run.seed,
    engineVersion: run.engineVersion,
    inputsDigest: run.inputsDigest,
    inputs: run.inputs,
    result: run.result,
  };
}

async function refuseCrowd(actor: Actor, transaction: Transaction): Promise<void> {
  const queued = await JobRow.count({
    where: {
      requestedBy: actor.personId,
      kind: 'compute-run',
      status: ['waiting', 'running'],
    },
    transaction,
  });
  if (queued < MOST_QUEUED) return;
  const message = `You have ${queued} runs on their way; ${MOST_QUEUED} are the most. Wait for one to end`;
  throw new TooMany(message, QUEUE_RETRY_S);
}

interface Selection extends MapReach {
  all: number;
  left: number;
}

/** What can be refused before anything is queued: nothing selected, or ranges beyond the maps. */
async function refuseUnanswerable(
  actor: Actor,
  recipe: AnalysisRecipe,
  transaction: Transaction,
): Promise<void> {
  await refuseWithdrawn(actor.collaborationId, recipe.surveyIds, transaction);
  const [selection] = await database().query<Selection>(
    `select count(*)::int as "all", (count(*) filter (where t.left_out_reason is null))::int as "left",
       max(m.mass_mjup[1]) as "massMinMjup",
       min(m.mass_mjup[cardinality(m.mass_mjup)]) as "massMaxMjup",
       max(m.semi_major_axis_au[1]) as "semiMajorAxisMinAu",
       min(m.semi_major_axis_au[cardinality(m.semi_major_axis_au)]) as "semiMajorAxisMaxAu"
     from target t left join completeness_map m
       on m.id = t.map_id and t.map_state = 'ready' and t.left_out_reason is null
     where t.collaboration_id = $1 and t.survey_id = any($2::uuid[])`,
    { bind: [actor.collaborationId, recipe.surveyIds], type: QueryTypes.SELECT, transaction },
  );
  const nothing = findEmptySelection(selection.left, selection.all);
  if (nothing) throw new InputError(nothing);
  // A selection may leave one of the two out: the run itself finds out.
  if (!recipe.sampleId) {
    await refuseUndecidedIn(actor.collaborationId, recipe.surveyIds, transaction);
  }
  const population = await PopulationRow.findOne({
    where: { id: recipe.populationId, collaborationId: actor.collaborationId },
    transaction,
  });
  if (!population) throw new NotFound('population');
  if (recipe.zeroOutsideMaps || selection.massMinMjup === null) return;
  // Maps of stars outside a sample do not matter: the run itself looks at those that do.
  if (recipe.sampleId !== undefined) return;
  // The masses of a mass ratio are each star's own: the run itself finds out whether they fit.
  if (population.definition.form === 'mass-ratio') return;
  const outside = findEdgeOutside(populationBox(population.definition), selection);
  if (outside) throw new InputError(outside);
}

/** Queues a run of the analysis as it stands; run and job are made together or not at all. */
export async function startRun(actor: Actor, key: string): Promise<RunSummary> {
  const analysis = await findAnalysis(actor, key);
  demand(actor, 'run-analysis', { isOwn: analysis.createdBy === actor.personId });
  const { id: analysisId } = analysis;
  const runId = await inTransaction(async (transaction) => {
    // One run after the other gets its number; the recipe is read under the same lock.
    await analysis.reload({ transaction, lock: transaction.LOCK.UPDATE });
    await refuseCrowd(actor, transaction);
    await refuseUnanswerable(actor, analysis.recipe, transaction);
    const { collaborationId } = actor;
    const last = await RunRow.max<number, RunRow>('number', { where: { analysisId }, transaction });
    const number = (last ?? 0) + 1;
    const asked = { collaborationId, requestedBy: actor.personId };
    const jobId = await enqueueRun(transaction, asked);
    const run = await RunRow.create(
      {
        collaborationId,
        analysisId,
        number,
        jobId,
        recipe: analysis.recipe,
        // From the recipe, so that the same question gets the same answer to the last digit.
        seed: digestOf(analysis.recipe).slice(0, SEED_LENGTH),
        engineVersion: ENGINE_VERSION,
        createdBy: actor.personId,
      },
      { transaction },
    );
    const summary = `started run ${number} of A-${analysis.number}`;
    await recordAudit(actor, 'run-analysis', { kind: 'run', id: run.id }, summary, transaction);
    return run.id;
  });
  const summaries = await summariseRuns([analysisId]);
  const summary = summaries.get(analysisId)?.find(({ id }) => id === runId);
  if (!summary) throw new NotFound('run');
  return summary;
}

export interface RunMaps {
  /** uint16 little-endian, shape [star, mass, semi-major axis], in the order of inputs.stars. */
  bytes: Buffer;
  shape: [number, number, number];
  digest: string;
}

/** The maps of all stars of a finished run on its grid: what its page computes from. */
export async function getRunMaps(actor: Actor, id: string): Promise<RunMaps> {
  const run = await findRun(actor, id);
  if (!run.inputs || !run.inputsDigest) throw new NotFound('maps of an unfinished run');
  const { stars } = run.inputs;
  const keys = stars.map(({ mapId }) => mapId);
  return { ...(await readStack(run.collaborationId, run.inputs, keys)), digest: run.inputsDigest };
}

/**
 * Stored maps of a run's stars, one a star in its order, on its grid.
 *
 * @throws NotFound naming the star whose map is gone
 */
export async function readStack(
  collaborationId: string,
  { stars, grid }: Pick<RunInputs, 'stars' | 'grid'>,
  mapIds: readonly string[],
): Promise<Omit<RunMaps, 'digest'>> {
  const axes = {
    massMjup: Float64Array.from(grid.massMjup),
    semiMajorAxisAu: Float64Array.from(grid.semiMajorAxisAu),
  };
  const shape: RunMaps['shape'] = [stars.length, axes.massMjup.length, axes.semiMajorAxisAu.length];
  const size = shape[1] * shape[2];
  const values = new Uint16Array(stars.length * size);
  try {
    await streamMaps(collaborationId, { by: 'id', keys: mapIds }, (map, place) => {
      values.set(valuesOnGrid(map, axes), place * size);
    });
  } catch (error) {
    if (!(error instanceof MissingMap)) throw error;
    throw new NotFound(`map of ${stars[mapIds.indexOf(error.key)]?.name}`);
  }
  return { bytes: ownBytes(values), shape };
}
