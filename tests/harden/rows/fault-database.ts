import type { Api } from '../api';
import { countMissing, found, query } from '../founders';
import { oneSurvey } from '../invented-sky';
import type { Bench, Laboratory, Measured, Row } from '../row';
import { askQuestion, importSurvey, pause, populationBody, startRun, until } from '../work';
import { isAway, type Writer, writeByApi, writeBySql } from '../writers';

const ROUNDS = 3;
const CALM_MS = 3000;
const BACK_S = 10;
const SQL_WRITERS = 4;

interface Outage {
  outageS: number;
  /** From the server's first good answer to that of web and worker. */
  webS: number;
  workerS: number;
}

const seconds = (from: number, to: number) => Number(((to - from) / 1000).toFixed(2));

/** The first time that something works again. */
const whenBack = (what: string, attempt: () => Promise<unknown>) =>
  until(
    what,
    async () => {
      try {
        await attempt();
        return Date.now();
      } catch (error) {
        if (isAway(error)) return null;
        throw error;
      }
    },
    { limitS: 60, everyMs: 25 },
  );

async function breakOnce(laboratory: Laboratory, api: Api, key: string): Promise<Outage> {
  const killedAt = Date.now();
  await laboratory.kill('postgres');
  await until('the database is down', async () => !(await laboratory.isDatabaseUp()));
  const backAt = await until(
    'the database is back',
    async () => (await laboratory.isDatabaseUp()) && Date.now(),
    { everyMs: 10 },
  );
  const webAt = await whenBack('the web server writes', () =>
    api.post('populations', populationBody(`after ${killedAt}`)),
  );
  const run = await startRun(api, key);
  const workerAt = await until('a worker takes a run', async () => {
    const { job } = await api.read<typeof run>(`runs/${run.id}`);
    return job.startedAt !== null && Date.now();
  });
  return {
    outageS: seconds(killedAt, backAt),
    webS: seconds(backAt, webAt),
    workerS: seconds(backAt, workerAt),
  };
}

async function countLost(databaseUrl: string, sql: Writer[], api: Writer[]): Promise<number> {
  const of = (writers: Writer[]) => writers.flatMap(({ acknowledged }) => acknowledged);
  const rows = { table: 'harden_write', column: 'id', names: of(sql) };
  const populations = { table: 'population', column: 'name', names: of(api) };
  return (await countMissing(databaseUrl, rows)) + (await countMissing(databaseUrl, populations));
}

async function measure({ laboratory: open, say }: Bench): Promise<Measured> {
  const laboratory = await open({ workers: 1, web: true });
  const { databaseUrl } = laboratory;
  const { as } = await found(laboratory, ['owner', 'statistician', 'collaborator', 'author']);
  const survey = await importSurvey(as.owner, oneSurvey('PLOVER', 20));
  const key = await askQuestion(as.owner, 'Before and after', [survey]);
  await query(databaseUrl, 'create table harden_write (id text primary key)');
  const sql = Array.from({ length: SQL_WRITERS }, (_, i) => writeBySql(() => databaseUrl, i));
  const api = [as.statistician, as.collaborator, as.author].map((one, i) =>
    writeByApi(one, `writer ${i}`),
  );
  const outages: Outage[] = [];
  for (let round = 0; round < ROUNDS; round++) {
    await pause(CALM_MS);
    const outage = await breakOnce(laboratory, as.owner, key);
    say(`down for ${outage.outageS} s, web after ${outage.webS} s, worker ${outage.workerS} s`);
    outages.push(outage);
  }
  await pause(CALM_MS);
  for (const writer of [...sql, ...api]) await writer.stop();
  const count = (writers: Writer[]) =>
    writers.reduce((sum, { acknowledged }) => sum + acknowledged.length, 0);
  const [byApi, bySql] = [count(api), count(sql)];
  const lost = await countLost(databaseUrl, sql, api);
  const wrong = api.flatMap((writer) => writer.wrong);
  const badPages = await laboratory.stopAndCheck();
  const most = (key: keyof Outage) => Math.max(...outages.map((outage) => outage[key]));
  return {
    isMet:
      lost === 0 &&
      byApi > 0 &&
      bySql > 0 &&
      badPages === 0 &&
      wrong.length === 0 &&
      most('webS') <= BACK_S &&
      most('workerS') <= BACK_S,
    figure:
      `${lost} of ${bySql} + ${byApi} writes lost (SQL + API) over ${ROUNDS} kills; down for at ` +
      `most ${most('outageS')} s, then web after ${most('webS')} s and worker after ` +
      `${most('workerS')} s; ${badPages} bad checksums; ${wrong.length} wrong answers`,
    details: { lost, byApi, bySql, badPages, wrong: wrong.length, outages },
    notes: wrong.slice(0, 5),
  };
}

export const row: Row = {
  name: 'fault-database',
  what: 'F4: the database server killed three times under writes',
  goal: `every acknowledged write there; web and worker go on at most ${BACK_S} s after it is back; 0 bad checksums; no answer but 503`,
  measure,
};
