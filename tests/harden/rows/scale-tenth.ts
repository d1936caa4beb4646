import { found, query } from '../founders';
import type { InventedSurvey } from '../invented-sky';
import type { Bench, Measured, Row } from '../row';
import { Stages } from '../stages';
import { askQuestion, importSurvey, startRun, untilRunEnds } from '../work';

const STARS = 500;
const NODES = 300;
const POINTS = 20;
const MAP_MB = (2 * NODES * NODES) / 2 ** 20;
const MOST_SECONDS = 600;
const WEB_MB = 600;
const surveyCount = () => Number(process.env.HARDEN_TENTH_SURVEYS ?? 5);
const GRID = {
  massMjup: { min: 0.5, max: 80, count: NODES },
  semiMajorAxisAu: { min: 1, max: 1000, count: NODES },
};

function surveyNumber(index: number): InventedSurvey {
  const first = 400_000 + STARS * index;
  const entries = Array.from({ length: STARS }, (_, i) => ({ star: first + i, by: null }));
  return { name: `TENTH ${index + 1}`, slug: `tenth-${index + 1}`, entries };
}

const SIZES = `
  select count(*)::int as maps, pg_total_relation_size('completeness_map') / 1048576.0 as maps_mb,
    pg_database_size(current_database()) / 1048576.0 as database_mb from completeness_map`;

async function measure({ laboratory: open, say }: Bench): Promise<Measured> {
  const laboratory = await open({ workers: 0, web: true });
  // One worker with a thread for each core, as `npm start` has it.
  await laboratory.addWorker(2);
  const { as } = await found(laboratory, ['owner']);
  const pidOf = (service: string) => laboratory.pidOf(service === 'worker' ? 'worker-1' : service);
  const stages = new Stages({ ...laboratory, pidOf }, say);
  const ids: string[] = [];
  for (let index = 0; index < surveyCount(); index++) {
    const survey = surveyNumber(index);
    await stages.time(`survey ${index + 1}`, async () => {
      ids.push(await importSurvey(as.owner, survey, { points: POINTS, mapSettings: GRID }));
    });
  }
  const [sizes] = await query<{ maps: number; maps_mb: string; database_mb: string }>(
    laboratory.databaseUrl,
    SIZES,
  );
  const key = await askQuestion(as.owner, 'A tenth', ids);
  const run = await stages.time('run', async () =>
    untilRunEnds(as.owner, (await startRun(as.owner, key)).id),
  );
  await stages.time('list of surveys', () => as.owner.read('surveys'));
  await stages.time('page of targets', () => as.owner.read('surveys/tenth-1/targets?limit=500'));
  const stars = surveyCount() * STARS;
  const rawMb = stars * MAP_MB;
  const { webMb, workerMb } = stages.peak;
  const mapsMb = Number(sizes.maps_mb);
  const surveysS = stages.sum('survey');
  return {
    isMet:
      run.stars === stars &&
      sizes.maps === stars &&
      mapsMb <= 1.1 * rawMb &&
      workerMb <= 3 * rawMb + 500 &&
      webMb <= WEB_MB &&
      surveysS + stages.seconds.run <= MOST_SECONDS,
    figure:
      `${stars} stars in ${surveyCount()} surveys on ${NODES} × ${NODES} nodes: files and maps in ` +
      `${surveysS} s, a run over all in ${stages.seconds.run} s (${run.job.status}); maps ` +
      `${mapsMb.toFixed(0)} MiB on the disk of ${rawMb.toFixed(0)} MiB of numbers, database ` +
      `${Number(sizes.database_mb).toFixed(0)} MiB; at most web ${webMb} MiB, worker ${workerMb} MiB`,
    details: { stars, rawMb, ...sizes, ...stages.details },
  };
}

export const row: Row = {
  name: 'scale-tenth',
  what: 'a tenth of 50 surveys × 500 stars × 300 × 300 nodes, through the API',
  goal: `every star in the run, within ${MOST_SECONDS} s; the maps no larger than their numbers and a tenth, the worker than three times that and 500 MiB, web under ${WEB_MB} MiB`,
  measure,
};
