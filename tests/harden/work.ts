import type { PopulationView } from '@/lib/schemas/populations';
import type { RunSummary } from '@/lib/schemas/runs';
import type { Api } from './api';
import { curvesFile, type InventedSurvey, targetsFile } from './invented-sky';

const OVER = ['done', 'failed', 'cancelled'];

export interface JobView {
  id: string;
  status: string;
  attempts?: number;
  startedAt: string | null;
  finishedAt: string | null;
  fault: string | null;
}

export const pause = (ms: number) => new Promise<void>((resolve) => setTimeout(resolve, ms));

/** Asks until there is an answer. @throws Error after the limit, which is there against hanging */
export async function until<Answer>(
  what: string,
  ask: () => Promise<Answer | null | false>,
  { limitS = 180, everyMs = 50 } = {},
): Promise<Answer> {
  const end = Date.now() + 1000 * limitS;
  for (;;) {
    const answer = await ask();
    if (answer !== null && answer !== false) return answer;
    if (Date.now() > end) throw new Error(`waited ${limitS} s until ${what}`);
    await pause(everyMs);
  }
}

export const filesOf = (survey: InventedSurvey, points: number) =>
  [
    {
      kind: 'targets',
      name: `${survey.slug}-targets.csv`,
      bytes: new TextEncoder().encode(targetsFile(survey)),
    },
    {
      kind: 'contrast-curves',
      name: `${survey.slug}-curves.csv`,
      bytes: new TextEncoder().encode(curvesFile(survey, points)),
    },
  ] as const;

const SMALL = {
  massMjup: { min: 1, max: 75, count: 30 },
  semiMajorAxisAu: { min: 1, max: 1000, count: 30 },
};

/** A survey on maps of 30 × 30 nodes, unless said. */
export const surveyBody = ({ name, slug }: InventedSurvey, mapSettings: object = SMALL) => ({
  name,
  slug,
  band: 'H',
  mapSettings,
});

/** Brings a survey in, and waits for its maps. @returns its id */
export async function importSurvey(
  api: Api,
  survey: InventedSurvey,
  { points = 20, mapSettings = SMALL as object } = {},
): Promise<string> {
  const { id } = await api.post<{ id: string }>('surveys', surveyBody(survey, mapSettings));
  for (const { kind, name, bytes } of filesOf(survey, points)) {
    await api.store((await api.upload(kind, survey.slug, name, bytes)).id);
  }
  const job = await untilMapsEnd(api, survey.slug);
  if (job.status !== 'done') throw new Error(`the maps of ${survey.name} ended: ${job.fault}`);
  return id;
}

export const untilMapsEnd = (api: Api, slug: string) =>
  until(
    `the maps of ${slug} have ended`,
    async () => {
      const { mapJob } = await api.read<{ mapJob: JobView | null }>(`surveys/${slug}`);
      return mapJob !== null && OVER.includes(mapJob.status) && mapJob;
    },
    { limitS: 400, everyMs: 200 },
  );

export const populationBody = (name: string) => ({
  name,
  convention: 'linear',
  definition: {
    form: 'power-law',
    massMinMjup: 2,
    massMaxMjup: 30,
    semiMajorAxisMinAu: 20,
    semiMajorAxisMaxAu: 300,
    massIndex: -1.3,
    semiMajorAxisIndex: -0.6,
  },
});

export const analysisBody = (name: string, surveyIds: string[], populationId: string) => ({
  name,
  recipe: {
    surveyIds,
    populationId,
    likelihood: 'host-fraction',
    prior: { law: 'uniform', max: 1 },
  },
});

/** A question to surveys. @returns its key */
export async function askQuestion(api: Api, name: string, surveyIds: string[]): Promise<string> {
  const population = await api.post<PopulationView>('populations', populationBody(name));
  const body = analysisBody(name, surveyIds, population.id);
  return (await api.post<{ key: string }>('analyses', body)).key;
}

export const startRun = (api: Api, key: string) => api.post<RunSummary>(`analyses/${key}/runs`, {});

export const readRun = (api: Api, id: string) => api.read<RunSummary>(`runs/${id}`);

export const untilRunEnds = (api: Api, id: string) =>
  until(
    `run ${id} has ended`,
    async () => {
      const run = await readRun(api, id);
      return OVER.includes(run.job.status) && run;
    },
    { limitS: 400 },
  );
