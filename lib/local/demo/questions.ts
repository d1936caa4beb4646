import type { Actor } from '@/lib/access/actor';
import { type StudySettings, studySettingsSchema } from '@/lib/schemas/study-settings';
import { listCoolingTables } from '@/lib/services/cooling-tables';
import { startStudy } from '@/lib/services/studies';

/** What a referee would ask of the lead analysis; every answer comes from the engine. */
const referee: unknown[] = [
  { kind: 'influence' },
  { kind: 'systematics' },
  { kind: 'calibration' },
  { kind: 'overlap-rules' },
  { kind: 'limit-map' },
  { kind: 'sweep', over: 'semi-major-axis-max', from: 60, to: 900 },
  { kind: 'free-indices' },
  { kind: 'counts' },
];

const planned: unknown = {
  kind: 'forecast',
  name: '120 more stars, one magnitude deeper',
  planned: { kind: 'stars-like-these', count: 120, deeperByMag: 1 },
};

/**
 * Asks the further questions of a finished run, all of them at once, and waits for their answers.
 *
 * @param finish waits until a job has ended, and fails when it has no result
 */
export async function askFurther(
  actor: Actor,
  runId: string,
  populationIds: string[],
  finish: (jobId: string) => Promise<void>,
): Promise<void> {
  // One other model: the demonstration is made anew before each of many tests.
  const cold = (await listCoolingTables(actor)).find(
    ({ startCondition }) => startCondition === 'cold',
  );
  const settings: StudySettings[] = [
    ...referee,
    { kind: 'ages-cooling', coolingTableIds: cold ? [cold.id] : [] },
    { kind: 'population-comparison', populationIds },
    planned,
  ].map((question) => studySettingsSchema.parse(question));
  const jobs: string[] = [];
  for (const question of settings) jobs.push((await startStudy(actor, runId, question)).job.id);
  for (const job of jobs) await finish(job);
}
