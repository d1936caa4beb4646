import { createRandom } from '@/lib/numerics/random';
import type { Api } from '../api';
import { found, join, query } from '../founders';
import { oneSurvey } from '../invented-sky';
import { JobWatch } from '../job-watch';
import type { Bench, Laboratory, Measured, Row } from '../row';
import { askQuestion, importSurvey, pause, startRun, until, untilRunEnds } from '../work';

const WORKERS = 3;
const STARS = 500;
const SECOND_S = 20;
const JOBS = 100;
const EVERY_MS = 2000;
const killCount = () => Number(process.env.HARDEN_KILLS ?? 20);
const stormS = () => Number(process.env.HARDEN_STORM_S ?? 60);
const SERVICES = Array.from({ length: WORKERS }, (_, i) => `worker-${i + 1}`);
const GRID = {
  massMjup: { min: 0.5, max: 80, count: 56 },
  semiMajorAxisAu: { min: 1, max: 1000, count: 64 },
};

interface Ended {
  status: string;
  attempts: number;
  digest: string | null;
}

interface Setting {
  laboratory: Laboratory;
  api: Api;
  collaborationId: string;
  key: string;
  watch: JobWatch;
  /** Seconds of an undisturbed run, and its result's digest. */
  calmS: number;
  digest: string;
}

async function prepare({ laboratory: open }: Bench): Promise<Setting> {
  const laboratory = await open({ workers: WORKERS, web: true });
  const { as, collaborationId } = await found(laboratory, ['owner']);
  const api = as.owner;
  const survey = await importSurvey(api, oneSurvey('PLOVER', STARS), { mapSettings: GRID });
  const key = await askQuestion(api, 'Again and again', [survey]);
  // The first run combines and warms; the second is what the others are like.
  await untilRunEnds(api, (await startRun(api, key)).id);
  const { job, resultDigest } = await untilRunEnds(api, (await startRun(api, key)).id);
  const calmS = (Date.parse(job.finishedAt ?? '') - Date.parse(job.startedAt ?? '')) / 1000;
  if (resultDigest === null) throw new Error(`the undisturbed run ended as ${job.status}`);
  const watch = new JobWatch(laboratory.databaseUrl);
  return { laboratory, api, collaborationId, key, watch, calmS, digest: resultDigest };
}

/** F1: a worker is killed at a random moment of a run, again and again. */
async function killMidRun({ laboratory, api, key, watch, calmS }: Setting) {
  const { uniform } = createRandom('mid-run 1');
  const jobs: string[] = [];
  const open = () => jobs.filter((id) => watch.isOpen(id)).length;
  while (watch.secondAttempts.length < killCount()) {
    while (open() < WORKERS) {
      const { job } = await startRun(api, key);
      jobs.push(job.id);
      await watch.look();
    }
    const alive = SERVICES.filter((service) => laboratory.isRunning(service));
    const victim = alive.find((service) => watch.isFirstTry(laboratory.pidOf(service)));
    if (victim === undefined || watch.killed.size >= killCount()) {
      await pause(20);
      continue;
    }
    await pause(900 * calmS * uniform());
    const pid = laboratory.pidOf(victim);
    await watch.look();
    if (watch.isFirstTry(pid) && (await laboratory.kill(victim))) watch.noteKill(pid);
  }
  await until('all runs have ended', async () => open() === 0);
  return jobs;
}

/** F12: a random worker is killed every two seconds while a hundred runs wait. */
async function storm({ laboratory, collaborationId, key, watch }: Setting) {
  const { uniform } = createRandom('storm 1');
  const jobs: string[] = [];
  // A person may have twenty runs on their way.
  for (let i = 0; i < JOBS; i += 20) {
    const api = await join(laboratory, collaborationId, 'owner');
    for (let k = 0; k < 20; k++) jobs.push((await startRun(api, key)).job.id);
  }
  const end = Date.now() + 1000 * stormS();
  let kills = 0;
  while (Date.now() < end) {
    await pause(EVERY_MS);
    if (await laboratory.kill(SERVICES[Math.floor(WORKERS * uniform())])) kills++;
  }
  await watch.look();
  await until('the hundred have ended', async () => !jobs.some((id) => watch.isOpen(id)), {
    limitS: 300,
  });
  return { jobs, kills };
}

const endOf = (databaseUrl: string, jobs: string[]) =>
  query<Ended>(
    databaseUrl,
    `select j.status, j.attempts, r.result_digest as digest
       from job j join run r on r.job_id = j.id where j.id = any($1::uuid[])`,
    [jobs],
  );

async function measure(bench: Bench): Promise<Measured> {
  const setting = await prepare(bench);
  const { laboratory, watch, calmS, digest } = setting;
  bench.say(`an undisturbed run takes ${calmS.toFixed(2)} s`);
  try {
    const first = await endOf(laboratory.databaseUrl, await killMidRun(setting));
    const { killed, secondAttempts } = watch;
    const slowestS = Math.max(...secondAttempts);
    const same = (ends: Ended[]) =>
      ends.filter((one) => one.status === 'done' && one.digest === digest).length;
    bench.say(`${killed.size} runs hit, second attempts after at most ${slowestS.toFixed(1)} s`);
    const { jobs, kills } = await storm(setting);
    const second = await endOf(laboratory.databaseUrl, jobs);
    const attempts = second.reduce((sum, one) => sum + one.attempts, 0);
    const failed = second.filter(({ status }) => status === 'failed').length;
    return {
      isMet:
        same(first) === first.length &&
        secondAttempts.length >= killCount() &&
        slowestS <= SECOND_S &&
        same(second) === JOBS &&
        second.length === JOBS,
      figure:
        `F1: ${killed.size} runs hit by kill -9 (a run takes ${calmS.toFixed(1)} s), second attempt ` +
        `after at most ${slowestS.toFixed(1)} s, ${same(first)} of ${first.length} results with the ` +
        `undisturbed bytes; F12: ${kills} kills, ${attempts} attempts at ${JOBS} jobs, ` +
        `${same(second)} results with these bytes, ${failed} failed`,
      details: { calmS, secondAttempts, runs: first.length, kills, attempts, failed },
    };
  } finally {
    await watch.stop();
  }
}

export const row: Row = {
  name: 'fault-workers',
  what: `F1, F12: workers killed in the middle of runs, and every ${EVERY_MS / 1000} s over ${JOBS} jobs`,
  goal: `second attempt at most ${SECOND_S} s after the kill; every run one result, with the bytes of an undisturbed one`,
  measure,
};
