import { Op, QueryTypes, type Transaction } from 'sequelize';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { Conflict, InputError, NotFound } from '@/lib/errors';
import { refuseWithdrawn } from '@/lib/queue/withdrawn-surveys';
import {
  type AnalysisRecipe,
  type AnalysisView,
  analysisRecipeSchema,
  type copyAnalysisSchema,
  type createAnalysisSchema,
  type updateAnalysisSchema,
} from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';
import {
  AnalysisRow,
  CombinationRow,
  database,
  FrozenRunRow,
  inTransaction,
  PersonRow,
  PopulationRow,
  RunRow,
  SampleRow,
  SurveyRow,
} from '@/models';
import { canonicalJson } from '@/models/digest';
import { findAnalysis } from './analysis-lookup';
import { recordAudit } from './audit';
import { listPopulations } from './populations';
import { summariseRuns } from './runs';
import { newRecipeDefaults } from './settings';
import { together } from './together';

const LONGEST_NAME = 120;

const isOwn = (actor: Actor, row: AnalysisRow) => row.createdBy === actor.personId;

/** Where an analysis stands, from its newest run that nobody stopped. */
function stateOf(
  recipe: AnalysisRecipe,
  runs: RunSummary[],
  newestRecipe: AnalysisRecipe | undefined,
): AnalysisView['state'] {
  const newest = runs.find(({ job }) => job.status !== 'cancelled');
  if (!newest) return 'draft';
  if (newest.job.status === 'failed') return 'failed';
  if (newest.job.status !== 'done') return 'running';
  const isSame = newestRecipe && canonicalJson(newestRecipe) === canonicalJson(recipe);
  return isSame ? 'run' : 'changed';
}

/** What hangs on analyses, read for all of them at once, whoever asks. */
async function readBehind(collaborationId: string, rows: AnalysisRow[]) {
  const ids = rows.map(({ id }) => id);
  const parentIds = rows.flatMap(({ parentId }) => parentId ?? []);
  const makerIds = rows.flatMap(({ createdBy }) => createdBy ?? []);
  const [surveys, parents, makers, runs, recipes] = await Promise.all([
    SurveyRow.findAll({ where: { collaborationId }, order: [['position', 'ASC']] }),
    AnalysisRow.findAll({ where: { id: parentIds } }),
    PersonRow.findAll({ where: { id: makerIds } }),
    summariseRuns(ids),
    RunRow.findAll({ attributes: ['id', 'recipe'], where: { analysisId: ids }, raw: true }),
  ]);
  const recipeOf = new Map(recipes.map((run) => [run.id, run.recipe]));
  return { rows, surveys, parents, makers, runs, recipeOf };
}

type Behind = Awaited<ReturnType<typeof readBehind>>;

async function describeAnalyses(actor: Actor, behind: Behind): Promise<AnalysisView[]> {
  const { rows, surveys, parents, makers, runs, recipeOf } = behind;
  if (rows.length === 0) return [];
  const { populations } = await listPopulations(actor);
  return rows.map((row) => {
    const population = populations.find(({ id }) => id === row.recipe.populationId);
    if (!population) throw new NotFound('population');
    const own = runs.get(row.id) ?? [];
    const parent = parents.find(({ id }) => id === row.parentId);
    const newest = own.find(({ job }) => job.status !== 'cancelled');
    const item = { isOwn: isOwn(actor, row) };
    return {
      id: row.id,
      key: `A-${row.number}`,
      number: row.number,
      name: row.name,
      recipe: row.recipe,
      population,
      surveys: surveys
        .filter(({ id }) => row.recipe.surveyIds.includes(id))
        .map(({ id, slug, name, position }) => ({ id, slug, name, position })),
      parent: parent ? `A-${parent.number}` : null,
      createdBy: makers.find(({ id }) => id === row.createdBy)?.name ?? null,
      createdAt: row.createdAt.toISOString(),
      updatedAt: row.updatedAt.toISOString(),
      runs: own,
      state: stateOf(row.recipe, own, newest && recipeOf.get(newest.id)),
      can: {
        run: may(actor, 'run-analysis', item),
        change: may(actor, 'save-analysis', item),
        remove: may(actor, 'remove-analysis', item) && own.length === 0,
        copy: may(actor, 'copy-analysis'),
      },
    };
  });
}

async function describeAnalysis(actor: Actor, row: AnalysisRow): Promise<AnalysisView> {
  const [view] = await describeAnalyses(actor, await readBehind(actor.collaborationId, [row]));
  return view;
}

async function readAllAnalyses(collaborationId: string): Promise<Behind> {
  const rows = await AnalysisRow.findAll({
    where: { collaborationId },
    order: [['number', 'DESC']],
  });
  return readBehind(collaborationId, rows);
}

/** All analyses, the newest first. */
export async function listAnalyses(actor: Actor): Promise<{ analyses: AnalysisView[] }> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const behind = await together(`analyses ${collaborationId}`, () =>
    readAllAnalyses(collaborationId),
  );
  return { analyses: await describeAnalyses(actor, behind) };
}

export async function getAnalysis(actor: Actor, key: string): Promise<AnalysisView> {
  return describeAnalysis(actor, await findAnalysis(actor, key));
}

/** Refuses a recipe that names what this collaboration does not have. */
async function checkRecipe(
  actor: Actor,
  recipe: AnalysisRecipe,
  transaction: Transaction,
): Promise<void> {
  const { collaborationId } = actor;
  const surveyIds = [...new Set(recipe.surveyIds)];
  if (surveyIds.length < recipe.surveyIds.length) {
    throw new InputError({
      code: 'repeated',
      column: 'recipe.surveyIds',
      found: 'a survey twice',
      expected: 'each survey once',
    });
  }
  const where = { collaborationId, id: surveyIds };
  if ((await SurveyRow.count({ where, transaction })) < surveyIds.length) {
    throw new NotFound('survey');
  }
  await refuseWithdrawn(collaborationId, surveyIds, transaction);
  const population = await PopulationRow.count({
    where: { collaborationId, id: recipe.populationId },
    transaction,
  });
  if (population === 0) throw new NotFound('population');
  if (recipe.sampleId !== undefined) {
    const sample = { collaborationId, id: recipe.sampleId };
    if ((await SampleRow.count({ where: sample, transaction })) === 0) throw new NotFound('sample');
  }
  await checkStoredCombination(collaborationId, recipe, transaction);
}

/** A recipe that names a stored combination states its surveys and its rule, and no others. */
async function checkStoredCombination(
  collaborationId: string,
  { combinationId: id, surveyIds, combination }: AnalysisRecipe,
  transaction: Transaction,
): Promise<void> {
  if (id === undefined) return;
  const stored = await CombinationRow.findOne({ where: { collaborationId, id }, transaction });
  if (!stored) throw new NotFound('combination');
  const { definition } = stored;
  const isSame =
    definition.rule === combination &&
    [...definition.surveyIds].sort().join() === [...surveyIds].sort().join();
  if (isSame) return;
  throw new InputError({
    code: 'inconsistent',
    column: 'recipe.combinationId',
    found: 'other surveys or another rule than those of the combination',
    expected: `the surveys and the rule of C-${stored.number} version ${stored.version}`,
  });
}

/** The next number of the collaboration, under a lock on its row. */
async function nextNumber(collaborationId: string, transaction: Transaction): Promise<number> {
  await database().query('select id from collaboration where id = $1 for update', {
    bind: [collaborationId],
    type: QueryTypes.SELECT,
    transaction,
  });
  const last = await AnalysisRow.max<number, AnalysisRow>('number', {
    where: { collaborationId },
    transaction,
  });
  return (last ?? 0) + 1;
}

interface NewAnalysis {
  name: string;
  recipe: AnalysisRecipe;
  parent: AnalysisRow | null;
}

/** A new analysis with its number, as a part of whatever else the transaction does. */
export async function addAnalysisIn(
  actor: Actor,
  { name, recipe, parent }: NewAnalysis,
  transaction: Transaction,
): Promise<AnalysisRow> {
  const { collaborationId, personId: createdBy } = actor;
  await checkRecipe(actor, recipe, transaction);
  const number = await nextNumber(collaborationId, transaction);
  const created = await AnalysisRow.create(
    { collaborationId, number, name, recipe, parentId: parent?.id ?? null, createdBy },
    { transaction },
  );
  const item = { kind: 'analysis', id: created.id };
  const action = parent ? 'copy-analysis' : 'save-analysis';
  const summary = parent
    ? `copied A-${parent.number} to A-${number}`
    : `began the analysis A-${number}`;
  await recordAudit(actor, action, item, summary, transaction);
  return created;
}

async function addAnalysis(actor: Actor, fields: NewAnalysis): Promise<AnalysisView> {
  const row = await inTransaction((transaction) => addAnalysisIn(actor, fields, transaction));
  return describeAnalysis(actor, row);
}

/** A new analysis; level and rule for shared stars follow the collaboration where it names none. */
export async function createAnalysis(
  actor: Actor,
  { name, recipe: given }: z.output<typeof createAnalysisSchema>,
): Promise<AnalysisView> {
  demand(actor, 'save-analysis', { isOwn: true });
  const usual = await newRecipeDefaults(actor.collaborationId);
  const recipe = {
    ...given,
    credibleLevel: given.credibleLevel ?? usual.credibleLevel,
    combination: given.combination ?? usual.combination,
  };
  return addAnalysis(actor, { name, recipe, parent: null });
}

/** A draft of one's own that remembers where it came from. */
export async function copyAnalysis(
  actor: Actor,
  key: string,
  input: z.output<typeof copyAnalysisSchema>,
): Promise<AnalysisView> {
  demand(actor, 'copy-analysis');
  const parent = await findAnalysis(actor, key);
  const ending = input.detections === 'none' ? ', zero detections' : ', copy';
  const name = input.name ?? `${parent.name.slice(0, LONGEST_NAME - ending.length)}${ending}`;
  const recipe = analysisRecipeSchema.parse({
    ...parent.recipe,
    ...(input.detections && { detections: input.detections }),
  });
  return addAnalysis(actor, { name, recipe, parent });
}

/** Changes name or recipe; finished runs keep the recipe that they were made with. */
/** What is released or may be, stays under the name that people have read. */
async function refuseFrozen({ id, number }: AnalysisRow, transaction: Transaction): Promise<void> {
  const own = `(select id from run where analysis_id = ${database().escape(id)})`;
  const where = { runId: { [Op.in]: database().literal(own) } };
  if ((await FrozenRunRow.count({ where, transaction })) === 0) return;
  throw new Conflict(`A-${number} has a frozen run, which keeps its name; copy it to name it anew`);
}

export async function updateAnalysis(
  actor: Actor,
  key: string,
  input: z.output<typeof updateAnalysisSchema>,
): Promise<AnalysisView> {
  const row = await findAnalysis(actor, key);
  demand(actor, 'save-analysis', { isOwn: isOwn(actor, row) });
  await inTransaction(async (transaction) => {
    if (input.recipe) await checkRecipe(actor, input.recipe, transaction);
    if (input.name !== undefined && input.name !== row.name) await refuseFrozen(row, transaction);
    await row.update(input, { transaction });
    const item = { kind: 'analysis', id: row.id };
    await recordAudit(actor, 'save-analysis', item, `changed A-${row.number}`, transaction);
  });
  return getAnalysis(actor, key);
}

/** Deletes a draft; an analysis with runs is somebody's evidence and stays. */
export async function removeAnalysis(actor: Actor, key: string): Promise<void> {
  const row = await findAnalysis(actor, key);
  demand(actor, 'remove-analysis', { isOwn: isOwn(actor, row) });
  await inTransaction(async (transaction) => {
    await row.reload({ transaction, lock: transaction.LOCK.UPDATE });
    const runs = await RunRow.count({ where: { analysisId: row.id }, transaction });
    const copies = await AnalysisRow.count({ where: { parentId: row.id }, transaction });
    if (runs > 0) throw new Conflict(`A-${row.number} has runs; only a draft is deleted`);
    if (copies > 0) throw new Conflict(`A-${row.number} was copied; its copies name it`);
    await row.destroy({ transaction });
    const item = { kind: 'analysis', id: row.id };
    await recordAudit(actor, 'remove-analysis', item, `deleted A-${row.number}`, transaction);
  });
}
