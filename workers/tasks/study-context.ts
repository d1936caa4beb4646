import { Transaction } from 'sequelize';
import { NotFound } from '@/lib/errors';
import type { Population } from '@/lib/population';
import { reportProgress } from '@/lib/queue/attempt';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { RunInputs, RunResult } from '@/lib/schemas/runs';
import type { StudyInputs } from '@/lib/schemas/studies';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf, StudyKind } from '@/lib/schemas/study-settings';
import type { MapGrid } from '@/lib/sensitivity';
import { database, PopulationRow, RunRow, StudyRow } from '@/models';
import type { StudyAnswer, StudyTask, StudyTasks } from '../compute/answer-study';
import type { Work } from '../perform';
import { readMaps } from './stored-maps';
import { questionOf, type RunQuestion } from './study-question';

/** What a study starts from: its finished run, and the ways to compute. */
export interface StudyWork {
  work: Work;
  study: StudyRow;
  collaborationId: string;
  run: { id: string; recipe: AnalysisRecipe; inputs: RunInputs; result: RunResult };
  population: Population;
  grid: MapGrid;
  /** The run's question with its maps, as it was answered. */
  question: RunQuestion;
  /** What was used beyond the run, for the study's inputs. */
  further: StudyInputs['further'];
  /** Maps to be kept with the answer: a stack of one digest a star, under its number. */
  kept: { stack: number; digests: readonly string[] }[];
  report(stage: string, done: number, total: number): Promise<void>;
  /** Runs one named part in a thread. */
  compute<Name extends keyof StudyTasks>(
    name: Name,
    input: StudyTasks[Name]['input'],
  ): Promise<StudyTasks[Name]['output']>;
}

export type StudyPerformer<Kind extends StudyKind> = (
  given: StudyWork,
  settings: SettingsOf<Kind>,
) => Promise<ResultOf<Kind>>;

interface Loaded {
  study: StudyRow;
  run: RunRow;
  population: PopulationRow;
}

function load({ attempt }: Work): Promise<Loaded> {
  const { REPEATABLE_READ: isolationLevel } = Transaction.ISOLATION_LEVELS;
  return database().transaction({ isolationLevel }, async (transaction) => {
    const { collaborationId, jobId } = attempt;
    const study = await StudyRow.findOne({ where: { jobId, collaborationId }, transaction });
    if (!study) throw new NotFound('further question for this job');
    const run = await RunRow.findOne({
      where: { id: study.runId, collaborationId },
      transaction,
      rejectOnEmpty: true,
    });
    const population = await PopulationRow.findOne({
      where: { id: run.recipe.populationId, collaborationId },
      transaction,
      rejectOnEmpty: true,
    });
    return { study, run, population };
  });
}

/** Reads a study's run, and the maps that it was computed from, by what the run itself stored. */
export async function openStudy(work: Work): Promise<StudyWork> {
  const { attempt, signal } = work;
  const { collaborationId } = attempt;
  const { study, run, population: row } = await load(work);
  const { recipe, inputs, result } = run;
  if (!inputs || !result) throw new Error(`run ${run.id} of study ${study.id} has no result`);
  const population = row.definition;
  const grid: MapGrid = {
    massMjup: Float64Array.from(inputs.grid.massMjup),
    semiMajorAxisAu: Float64Array.from(inputs.grid.semiMajorAxisAu),
  };
  const digests = inputs.stars.map(({ mapDigest }) => mapDigest);
  const maps = await readMaps(collaborationId, digests, grid);
  return {
    work,
    study,
    collaborationId,
    run: { id: run.id, recipe, inputs, result },
    population,
    grid,
    question: questionOf({ maps, grid, population, recipe, inputs }),
    further: [],
    kept: [],
    report(stage, done, total) {
      signal.throwIfAborted();
      return reportProgress(attempt, stage, done, total);
    },
    compute(name, input) {
      const task = { name, input } as StudyTask;
      return work.pool.run<StudyTask, StudyAnswer>('answer-study', task, { signal }) as never;
    },
  };
}
