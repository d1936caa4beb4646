import { expect } from 'vitest';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { type StudyInputs, studyInputsSchema } from '@/lib/schemas/studies';
import { type ResultOf, studyResultSchema } from '@/lib/schemas/study-results';
import { type StudyKind, studySettingsSchema } from '@/lib/schemas/study-settings';
import { startStudy } from '@/lib/services/studies';
import { PopulationRow, type RunRow, StudyRow } from '@/models';
import type { RunQuestion } from '@/workers/answers/run-question';
import { readMaps } from '@/workers/tasks/stored-maps';
import { questionOf } from '@/workers/tasks/study-question';
import { untilEnded } from './work';

export type GivenSettings<Kind extends StudyKind> = Extract<
  z.input<typeof studySettingsSchema>,
  { kind: Kind }
>;

export interface EndedStudy<Kind extends StudyKind> {
  study: StudyRow;
  inputs: StudyInputs;
  result: ResultOf<Kind>;
}

/** Starts a study of a run and waits for its result; a fault fails the test. */
export async function askToEnd<Kind extends StudyKind>(
  actor: Actor,
  run: RunRow,
  settings: GivenSettings<Kind>,
): Promise<EndedStudy<Kind>> {
  const { id, job } = await startStudy(actor, run.id, studySettingsSchema.parse(settings));
  const ended = await untilEnded(job.id);
  expect(ended.fault).toBeNull();
  expect(ended.status).toBe('done');
  const study = await StudyRow.findByPk(id, { rejectOnEmpty: true });
  expect(study.headline).toBeTruthy();
  return {
    study,
    inputs: studyInputsSchema.parse(study.inputs),
    result: studyResultSchema.parse(study.result) as ResultOf<Kind>,
  };
}

/** The question of a finished run with its stored maps, for asking the pure functions directly. */
export async function questionOfRun(run: RunRow): Promise<RunQuestion> {
  const { inputs, recipe, collaborationId } = run;
  if (!inputs) throw new Error('the run has no inputs');
  const grid = {
    massMjup: Float64Array.from(inputs.grid.massMjup),
    semiMajorAxisAu: Float64Array.from(inputs.grid.semiMajorAxisAu),
  };
  const digests = inputs.stars.map(({ mapDigest }) => mapDigest);
  const maps = await readMaps(collaborationId, digests, grid);
  const row = await PopulationRow.findByPk(recipe.populationId, { rejectOnEmpty: true });
  return questionOf({ maps, grid, population: row.definition, recipe, inputs });
}
