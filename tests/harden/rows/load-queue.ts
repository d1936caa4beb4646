import { setTimeout as pause } from 'node:timers/promises';
import { Api } from '../api';
import { addMember, withRows } from '../laboratory-rows';
import type { Bench, Measured, Row, RunningProduct } from '../row';

const A = 'breakwater';
const B = 'lantern-array';
/** What one person may have queued, and so many people. */
const RUNS_EACH = 20;
const PEOPLE = 10;
const LONGEST_S = 600;
/** Fewer would be worked off whatever the order. */
const LEAST_WAITING = 50;

interface RunAnswer {
  id: string;
  job: { id: string };
}

interface Ended {
  status: string;
  attempts: number;
  digest: string | null;
  startedAt: Date | null;
}

/** An analysis of the small collaboration, with a member who may run it. */
async function prepareOther(product: RunningProduct): Promise<{ api: Api; key: string }> {
  const { token } = await addMember(product, B, ['owner', 'statistician']);
  const api = new Api(product, token, B);
  const { surveys } = await api.read<{ surveys: { id: string }[] }>('surveys');
  const population = await api.post<{ id: string }>('populations', {
    name: 'For the queue',
    convention: 'linear',
    definition: {
      form: 'power-law',
      massMinMjup: 2,
      massMaxMjup: 30,
      semiMajorAxisMinAu: 20,
      semiMajorAxisMaxAu: 100,
      massIndex: -1.3,
      semiMajorAxisIndex: -0.6,
    },
  });
  const { key } = await api.post<{ key: string }>('analyses', {
    name: 'After the crowd',
    recipe: {
      surveyIds: [surveys[0].id],
      populationId: population.id,
      likelihood: 'host-fraction',
      prior: { law: 'uniform', max: 1 },
    },
  });
  return { api, key };
}

const readEnds = (product: RunningProduct, jobIds: string[]) =>
  withRows(product, (query) =>
    query<Ended>(
      `select j.status, j.attempts, r.result_digest as digest, j.started_at as "startedAt"
       from job j join run r on r.job_id = j.id where j.id = any($1::uuid[])`,
      [jobIds],
    ),
  );

/** Where things stand by the database's clock. */
const readMoment = (product: RunningProduct, jobIds: string[]) =>
  withRows(product, async (query) => {
    const [row] = await query<{ now: Date; waiting: number }>(
      `select clock_timestamp() as now,
         (select count(*)::int from job where id = any($1::uuid[]) and status = 'waiting') as waiting`,
      [jobIds],
    );
    return row;
  });

async function untilAllEnded(product: RunningProduct, jobIds: string[]): Promise<Ended[]> {
  const start = performance.now();
  for (;;) {
    const ends = await readEnds(product, jobIds);
    const open = ends.filter(({ status }) => status === 'waiting' || status === 'running');
    const isLate = performance.now() - start > 1000 * LONGEST_S;
    if (open.length === 0 || isLate) return ends;
    await pause(500);
  }
}

async function measure({ product, say }: Bench): Promise<Measured> {
  const running = await product();
  const other = await prepareOther(running);
  const people = await Promise.all(
    Array.from({ length: PEOPLE }, () => addMember(running, A, ['statistician'])),
  );
  const { analyses } = await new Api(running).read<{ analyses: { key: string; name: string }[] }>(
    'analyses',
  );
  const lead =
    analyses.find(({ name }) => name.startsWith('Giant planets'))?.key ?? analyses[0].key;
  const start = performance.now();
  const queued = await Promise.all(
    people.map(async ({ token }) => {
      const api = new Api(running, token, A);
      const jobs: string[] = [];
      for (let i = 0; i < RUNS_EACH; i++) {
        jobs.push((await api.post<RunAnswer>(`analyses/${lead}/runs`, {})).job.id);
      }
      return jobs;
    }),
  );
  const ofA = queued.flat();
  const askedS = (performance.now() - start) / 1000;
  const { job } = await other.api.post<RunAnswer>(`analyses/${other.key}/runs`, {});
  const { now: askedAt, waiting } = await readMoment(running, ofA);
  say(`${ofA.length} runs queued in ${askedS.toFixed(1)} s, ${waiting} of them wait`);
  const [endOfB] = await untilAllEnded(running, [job.id]);
  const ends = await untilAllEnded(running, ofA);
  const totalS = (performance.now() - start) / 1000;
  const startedB = endOfB.startedAt;
  const ahead = ends.filter(
    ({ startedAt }) => startedAt && startedB && startedAt > askedAt && startedAt < startedB,
  ).length;
  const done = [...ends, endOfB].filter(({ status, digest }) => status === 'done' && digest);
  const digests = new Set(ends.map(({ digest }) => digest));
  const again = [...ends, endOfB].filter(({ attempts }) => attempts !== 1).length;
  const waitedS = startedB ? (startedB.getTime() - askedAt.getTime()) / 1000 : null;
  const runs = ofA.length + 1;
  return {
    isMet:
      waiting >= LEAST_WAITING &&
      startedB !== null &&
      ahead === 0 &&
      ends.length === ofA.length &&
      done.length === runs &&
      digests.size === 1 &&
      again === 0,
    figure:
      `${waiting} of ${ofA.length} runs waited when B asked; ${ahead} of them started before B's, ` +
      `which began after ${waitedS === null ? 'never' : `${Math.max(0, waitedS).toFixed(2)} s`}; ` +
      `${done.length} of ${runs} ended with a result, ${again} in more than one attempt, ` +
      `${digests.size} distinct among A's; all in ${totalS.toFixed(0)} s`,
    details: { waiting, ahead, waitedS, done: done.length, again, digests: digests.size, totalS },
  };
}

export const row: Row = {
  name: 'load-queue',
  what: 'L3: 200 runs of one collaboration, then one of another',
  goal: "B's starts next; all 201 end, with one result each and the same for the same question",
  measure,
};
