import { Api } from '../api';
import { measureEngine } from '../engine-time';
import { curvesFile, oneSurvey, targetsFile } from '../invented-sky';
import { readAlone } from '../read-alone';
import type { Bench, Measured, Row } from '../row';
import { Stages } from '../stages';

/** As many points in all as one file of curves may hold. */
const POINTS = 20;
const MOST_SECONDS = 300;
const WEB_MB = 600;
const WORKER_MB = 800;
const starCount = () => Number(process.env.HARDEN_STARS ?? 5000);

interface SurveyMaps {
  job: { status: string; startedAt: string | null; finishedAt: string | null } | null;
  maps: { state: string }[];
}

async function waitForMaps(api: Api, slug: string): Promise<SurveyMaps> {
  for (;;) {
    const { mapJob } = await api.read<{ mapJob: SurveyMaps['job'] }>(`surveys/${slug}`);
    if (mapJob && mapJob.status !== 'waiting' && mapJob.status !== 'running') {
      return api.read(`surveys/${slug}/maps`);
    }
    await new Promise((resolve) => setTimeout(resolve, 500));
  }
}

async function measure({ product, say, root }: Bench): Promise<Measured> {
  const stars = starCount();
  const survey = oneSurvey('PLOVER', stars);
  const files = {
    targets: new TextEncoder().encode(targetsFile(survey)),
    curves: new TextEncoder().encode(curvesFile(survey, POINTS)),
  };
  const running = await product();
  const api = new Api(running);
  await api.post('surveys', { name: survey.name, band: 'H' });
  const stages = new Stages(running, say);
  for (const what of ['targets', 'curves'] as const) {
    const kind = what === 'targets' ? what : 'contrast-curves';
    const name = `plover-${what}.csv`;
    const sent = await stages.time(`send ${what}`, () =>
      api.upload(kind, survey.slug, name, files[what]),
    );
    await stages.time(`store ${what}`, () => api.store(sent.id));
  }
  const { job, maps } = await stages.time('maps', () => waitForMaps(api, survey.slug));
  const ready = maps.filter(({ state }) => state === 'ready').length;
  await stages.time('list of surveys', () => api.read('surveys'));
  await stages.time('list of maps', () => api.read(`surveys/${survey.slug}/maps`));
  await stages.time('page of targets', () => api.read(`surveys/${survey.slug}/targets?limit=500`));
  const engine = await measureEngine(stars);
  const alone = await readAlone(root, 'contrast-curves', files.curves);
  const importSeconds = stages.sum('send', 'store');
  const mapSeconds = stages.seconds.maps;
  const { webMb, workerMb } = stages.peak;
  return {
    isMet:
      ready === stars &&
      job?.status === 'done' &&
      importSeconds + mapSeconds <= MOST_SECONDS &&
      webMb <= WEB_MB &&
      workerMb <= WORKER_MB,
    figure:
      `${stars} stars, ${stars * POINTS} curve points: imported in ${importSeconds} s, ` +
      `${ready} maps in ${mapSeconds} s (engine alone, one thread: ${engine.seconds} s); ` +
      `most memory: web ${webMb} MB, worker ${workerMb} MB, reading thread ${alone.mostMb} MB`,
    details: { stars, ...stages.details, ready, engine, readingThread: alone },
  };
}

export const row: Row = {
  name: 'large-survey',
  what: 'a survey of 5000 stars: targets and curves through the API, then its maps',
  goal: `all maps ready within ${MOST_SECONDS} s; web under ${WEB_MB} MB, worker under ${WORKER_MB} MB`,
  measure,
};
