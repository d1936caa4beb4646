import path from 'node:path';
import type { Api } from '../api';
import { engineRate } from '../engine-alone';
import { found, query } from '../founders';
import type { InventedSurvey } from '../invented-sky';
import type { Bench, Laboratory, Measured, Row } from '../row';
import { filesOf, type JobView, surveyBody, until } from '../work';

const COUNTS = [1, 2, 4];
const SURVEYS = 8;
const STARS = 150;
const POINTS = 20;
/** As large as the laboratory's usual maps and a half: maps must outweigh what surrounds them. */
const GRID = {
  massMjup: { min: 0.5, max: 80, count: 84 },
  semiMajorAxisAu: { min: 1, max: 1000, count: 96 },
};
const ENGINE_MAPS = 1500;
/** Of the speed-up that the bare engine has on the same machine at the same time. */
const LEAST_SHARE = 0.8;

interface Step {
  workers: number;
  seconds: number;
  /** Maps a second, of the product and of as many processes of the bare engine. */
  rate: number;
  engineRate: number;
}

function surveyOf(set: number, index: number): InventedSurvey {
  const first = 300_000 + STARS * (SURVEYS * set + index);
  const entries = Array.from({ length: STARS }, (_, i) => ({ star: first + i, by: null }));
  return { name: `SET ${set} ${index}`, slug: `set-${set}-${index}`, entries };
}

const jobOf = async (api: Api, slug: string) =>
  (await api.read<{ mapJob: JobView }>(`surveys/${slug}`)).mapJob;

/** Brings surveys in while nobody computes. @returns the jobs of their maps, set aside */
async function waitingJobs(api: Api, set: number): Promise<string[]> {
  const jobs: string[] = [];
  for (let index = 0; index < SURVEYS; index++) {
    const survey = surveyOf(set, index);
    await api.post('surveys', surveyBody(survey, GRID));
    for (const { kind, name, bytes } of filesOf(survey, POINTS)) {
      await api.store((await api.upload(kind, survey.slug, name, bytes)).id);
    }
    const { id } = await jobOf(api, survey.slug);
    await api.post(`jobs/${id}/cancel`, {});
    jobs.push(id);
  }
  return jobs;
}

const SPAN = `
  select count(*) filter (where status = 'done')::int as done,
    count(*) filter (where status in ('waiting', 'running'))::int as open,
    extract(epoch from max(finished_at) - min(started_at))::float as seconds
  from job where id = any($1::uuid[])`;

/** Lets the workers that there are do a set's maps. @returns seconds from the first start to the last end */
async function compute({ databaseUrl }: Laboratory, api: Api, jobs: string[]): Promise<number> {
  for (const id of jobs) await api.post(`jobs/${id}/retry`, {});
  const { done, seconds } = await until('the maps are there', async () => {
    const [span] = await query<{ done: number; open: number; seconds: number }>(databaseUrl, SPAN, [
      jobs,
    ]);
    return span.open === 0 && span;
  });
  if (done !== jobs.length) throw new Error(`${done} of ${jobs.length} jobs of maps were done`);
  return seconds;
}

async function measure({ laboratory: open, root, bundleFolder, say }: Bench): Promise<Measured> {
  const laboratory = await open({ workers: 0, web: true });
  const { as } = await found(laboratory, ['owner']);
  const sets = [];
  for (const set of COUNTS.keys()) sets.push(await waitingJobs(as.owner, set));
  const steps: Step[] = [];
  let workers = 0;
  for (const [set, count] of COUNTS.entries()) {
    for (; workers < count; workers++) await laboratory.addWorker();
    const bare = await engineRate(path.join(root, bundleFolder), count, ENGINE_MAPS / count);
    const seconds = await compute(laboratory, as.owner, sets[set]);
    const rate = (SURVEYS * STARS) / seconds;
    steps.push({ workers, seconds, rate, engineRate: bare });
    say(`${workers} workers: ${rate.toFixed(0)} maps/s, the bare engine ${bare.toFixed(0)} maps/s`);
  }
  const [one, ...more] = steps;
  const gains = more.map((step) => ({
    workers: step.workers,
    product: step.rate / one.rate,
    engine: step.engineRate / one.engineRate,
  }));
  const [two] = gains;
  const words = gains.map(
    ({ workers: count, product, engine }) =>
      `${count} workers ×${product.toFixed(2)} (bare engine ×${engine.toFixed(2)})`,
  );
  return {
    isMet: two.product >= LEAST_SHARE * two.engine,
    figure:
      `${SURVEYS * STARS} maps of 84 × 96 nodes: one worker ${one.rate.toFixed(0)} maps/s; ` +
      words.join(', '),
    details: { steps, gains },
  };
}

export const row: Row = {
  name: 'scale-workers',
  what: 'several worker processes against one database',
  goal: `two workers at least ${LEAST_SHARE} of the speed-up that two processes of the bare engine have at that moment`,
  measure,
};
