import { Transaction } from 'sequelize';
import { InputError, NotFound } from '@/lib/errors';
import { type Population, sampleBox } from '@/lib/population';
import { complete, hold, reportProgress } from '@/lib/queue/attempt';
import { findEdgeOutside } from '@/lib/queue/preconditions';
import { select } from '@/lib/queue/statement';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { type RunInputs, type RunResult, runResultSchema } from '@/lib/schemas/runs';
import type { MapGrid } from '@/lib/sensitivity';
import { database, inTransaction, PopulationRow, RunRow } from '@/models';
import { digestOf } from '@/models/digest';
import type { AnswerRunInput, AnswerRunOutput } from '../compute/answer-run';
import type { Work } from '../perform';
import { tellOfEnd } from '../run-mail';
import { type MapShelf, tableShelf } from './map-shelf';
import { treatCandidates, warnCutAndCounted } from './run-candidates';
import { type MergedCompanions, mergeCompanions } from './run-companions';
import { hostMassesFor } from './run-hosts';
import { combineMaps, commonGrid, enginesOfMaps } from './run-maps';
import { assembleResult, countCompanions } from './run-result';
import { collectSample, type Sample } from './run-sample';
import { describeShared } from './run-shared';
import { type MapStack, stackMaps } from './run-stack';
import { describeCombination, describeMaps } from './run-words';

/** What a run starts from, read at one moment. */
export interface Collected {
  run: Pick<RunRow, 'recipe' | 'engineVersion' | 'seed'>;
  population: Pick<PopulationRow, 'id' | 'number' | 'version' | 'name' | 'digest' | 'definition'>;
  sample: Sample;
  /** Shape [star] [M_Sun], where the population depends on it. */
  hostMassMsun: Float64Array | undefined;
  companions: MergedCompanions;
  /** Surveys of other collaborations, with their attribution. */
  shared?: RunInputs['shared'];
}

/** What a run gives: its inputs as they were used, its result, and what it is stored with. */
export interface Computed {
  inputs: RunInputs;
  result: RunResult;
  completenessPerStar: number[];
}

/**
 * Computes one run: sample, maps, population, posterior. The result is stored once, in the
 * transaction that ends the job, by the attempt that holds it.
 */
export async function performComputeRun(work: Work): Promise<void> {
  const { attempt } = work;
  const enter = (stage: string, total: number) => {
    work.signal.throwIfAborted();
    return reportProgress(attempt, stage, 0, total);
  };
  await enter('collect', 1);
  const { run, ...collected } = await collect(work);
  const computed = await computeCollected(work, { run, ...collected }, tableShelf(work), {
    enter,
    combined: (done, total) => reportProgress(attempt, 'combine', done, total),
  });
  await enter('store', 1);
  await store(work, run, computed);
}

/**
 * From what was collected to the result; where the maps lie is the shelf's business.
 *
 * @throws InputError where stars cannot follow the rule of combination, or ranges reach past the maps
 */
export async function computeCollected(
  work: Work,
  collected: Collected,
  shelf: MapShelf,
  report: {
    enter(stage: string, total: number): Promise<void>;
    combined(done: number, total: number): Promise<void>;
  },
): Promise<Computed> {
  const { run, population, sample, hostMassMsun, companions } = collected;
  const { recipe } = run;
  const grid = commonGrid(sample);
  const digests = await combineMaps(work, sample, recipe.combination, grid, report.combined, shelf);
  await report.enter('integrate', sample.stars.length);
  const { definition } = population;
  const stack = await stackMaps(shelf, sample.stars, digests, grid, definition, hostMassMsun);
  refuseOutside(recipe, definition, stack, hostMassMsun);
  await report.enter('posterior', 1);
  const inputs = describeInputs(collected, stack, grid);
  const counted = countCompanions(companions.confirmed, inputs, definition, recipe);
  const candidates = treatCandidates(inputs, definition, recipe, hostMassMsun);
  const output = await work.pool.run<AnswerRunInput, AnswerRunOutput>(
    'answer-run',
    {
      maps: stack.maps,
      grid,
      population: definition,
      ...(hostMassMsun && { hostMassMsun }),
      likelihood: recipe.likelihood,
      prior: recipe.prior,
      credibleLevel: recipe.credibleLevel,
      detections: counted.counted.map(({ name }, i) => ({
        name,
        star: counted.detectedStars[i],
      })),
      ...(candidates.treatment && {
        candidates: candidates.treatment,
        candidateNames: candidates.counted.map(({ name }) => name),
      }),
      ...(recipe.background !== undefined && { background: recipe.background }),
      surveysOfStar: inputs.stars.map(({ surveys }) =>
        surveys.map((id) => inputs.surveys.findIndex((survey) => survey.id === id)),
      ),
      surveys: inputs.surveys.length,
    },
    { signal: work.signal, transfer: [stack.maps.buffer] },
  );
  const result = runResultSchema.parse(
    assembleResult({
      inputs,
      recipe,
      population: definition,
      stack,
      counted,
      candidates,
      warnings: [warnCutAndCounted(sample, candidates)].filter((warning) => warning !== null),
      output,
      grid,
    }),
  );
  return { inputs, result, completenessPerStar: output.completenessPerStar };
}

function collect({ attempt }: Work): Promise<Collected & { run: RunRow }> {
  const { REPEATABLE_READ: isolationLevel } = Transaction.ISOLATION_LEVELS;
  return database().transaction({ isolationLevel }, async (transaction) => {
    const { collaborationId, jobId } = attempt;
    const run = await RunRow.findOne({ where: { jobId, collaborationId }, transaction });
    if (!run) throw new NotFound('run for this job');
    const population = await PopulationRow.findOne({
      where: { id: run.recipe.populationId, collaborationId },
      transaction,
    });
    if (!population) throw new NotFound('population');
    const sample = await collectSample(collaborationId, run.recipe, transaction);
    const hostMassMsun = hostMassesFor(population.definition, sample.stars);
    const companions = await mergeCompanions(sample.stars, population.definition, transaction);
    const shared = await describeShared(sample.surveys, transaction);
    return { run, population, sample, hostMassMsun, companions, shared };
  });
}

function refuseOutside(
  recipe: AnalysisRecipe,
  population: Population,
  stack: MapStack,
  hostMassMsun: Float64Array | undefined,
): void {
  const box = sampleBox(population, hostMassMsun ?? new Float64Array());
  const fault = box && findEdgeOutside(box, stack.reach);
  if (fault && (!recipe.zeroOutsideMaps || stack.shareOutsideMaps >= 1)) {
    throw new InputError({ code: fault.code, message: fault.message });
  }
}

function describeInputs(
  { run, population, sample, companions, shared }: Collected,
  stack: MapStack,
  grid: MapGrid,
): RunInputs {
  const entriesOf = (surveyId: string) =>
    stack.stars.filter(({ surveys }) => surveys.includes(surveyId)).length;
  const inSeveral = sample.stars.filter(({ entries }) => entries.length > 1).length;
  return {
    engineVersion: run.engineVersion,
    seed: run.seed,
    grid: { massMjup: [...grid.massMjup], semiMajorAxisAu: [...grid.semiMajorAxisAu] },
    population: {
      id: population.id,
      key: `P-${population.number}`,
      version: population.version,
      name: population.name,
      digest: population.digest,
    },
    surveys: sample.surveys.map(({ row: { id, slug, name, position } }) => ({
      id,
      slug,
      name,
      position,
      entries: entriesOf(id),
    })),
    combination: describeCombination(run.recipe.combination, inSeveral, sample.surveys.length),
    ...describeMaps(sample),
    mapEngines: enginesOfMaps(sample, run.recipe.combination),
    ...(sample.selection && { sample: sample.selection }),
    ...(sample.combination && { storedCombination: sample.combination.words }),
    ...(sample.adopted.length > 0 && { adopted: sample.adopted }),
    stars: stack.stars,
    companions: companions.confirmed,
    undecided: companions.undecided.map((candidate) => ({ ...candidate })),
    ...(shared && shared.length > 0 && { shared }),
    leftOut: sample.leftOut,
  };
}

async function store(
  { attempt }: Work,
  run: RunRow,
  { inputs, result, completenessPerStar }: Computed,
): Promise<void> {
  await inTransaction(async (transaction) => {
    await hold(transaction, attempt);
    await run.update(
      {
        inputs,
        inputsDigest: digestOf({ recipe: run.recipe, inputs }),
        result,
        resultDigest: digestOf(result),
        finishedAt: new Date(),
      },
      { transaction },
    );
    await storeRunStars(attempt.collaborationId, run.id, inputs, completenessPerStar, transaction);
    await reportProgress(attempt, 'store', 1, 1, transaction);
    await complete(transaction, attempt);
    await tellOfEnd(transaction, attempt.jobId, 'finished');
  });
}

async function storeRunStars(
  collaborationId: string,
  runId: string,
  inputs: RunInputs,
  completeness: number[],
  transaction: Transaction,
): Promise<void> {
  const rows = inputs.stars.map(({ starId, mapId, surveys }, position) => ({
    position,
    star_id: starId,
    map_id: mapId,
    survey_ids: surveys,
    mean_completeness: completeness[position],
  }));
  await select(
    `insert into run_star
       (run_id, position, collaboration_id, star_id, map_id, survey_ids, mean_completeness)
     select $1, s.position, $2, s.star_id, s.map_id,
       array(select jsonb_array_elements_text(s.survey_ids)::uuid), s.mean_completeness
     from jsonb_to_recordset($3::jsonb) as s(
       position int, star_id uuid, map_id uuid, survey_ids jsonb, mean_completeness double precision)
     returning position`,
    [runId, collaborationId, JSON.stringify(rows)],
    transaction,
  );
}
