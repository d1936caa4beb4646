import type { AnalysisView } from '@/lib/schemas/analyses';
import type { PopulationView } from '@/lib/schemas/populations';
import type { ReleaseView } from '@/lib/schemas/releases';
import type { RunSummary } from '@/lib/schemas/runs';
import type { UploadView } from '@/lib/schemas/uploads';
import type { Api } from './api';
import type { InventedSurvey } from './invented-sky';
import { Steady } from './steady';
import {
  analysisBody,
  filesOf,
  type JobView,
  pause,
  populationBody,
  startRun,
  surveyBody,
} from './work';

const STARS = 60;
const POINTS = 20;
const NOTE_CHARACTERS = 40_000;

export type Staff = Record<'owner' | 'author' | 'statistician', Api>;

export interface Script {
  steady: Steady;
  /** Jobs that a person started again after three attempts that were killed. */
  startedAgain: number;
}

/** A survey of its own stars. */
function surveyNumber(index: number): InventedSurvey {
  const entries = Array.from({ length: STARS }, (_, i) => ({
    star: 200_000 + 1000 * index + i,
    by: null,
  }));
  return { name: `SURVEY ${index}`, slug: `survey-${index}`, entries };
}

/** Long notes make a file that takes a while to send and to read. */
function withNotes(bytes: Uint8Array): Uint8Array<ArrayBuffer> {
  const note = 'seen through thin cloud '.repeat(NOTE_CHARACTERS / 24);
  const [head, ...lines] = new TextDecoder().decode(bytes).trimEnd().split(/\r?\n/);
  const noted = lines.map((line, i) => `${line},${i} ${note}`);
  return new TextEncoder().encode(`${[`${head},notes`, ...noted].join('\n')}\n`);
}

async function bringIn(steady: Steady, api: Api, survey: InventedSurvey): Promise<void> {
  for (const { kind, name, bytes } of filesOf(survey, POINTS)) {
    const sent = kind === 'targets' ? withNotes(bytes) : new Uint8Array(bytes);
    const find = async () => {
      const { uploads } = await api.read<{ uploads: UploadView[] }>(
        `uploads?survey=${survey.slug}`,
      );
      return uploads.find(({ fileName }) => fileName === name);
    };
    const { id } = await steady.settle(find, () => api.upload(kind, survey.slug, name, sent));
    const isStored = async () => (await find())?.state === 'stored';
    await steady.settle(isStored, () => api.store(id));
  }
}

/** Waits for a job's end, and starts one again that was killed too often. */
async function finish(script: Script, api: Api, job: () => Promise<JobView | null>): Promise<void> {
  for (;;) {
    const now = await script.steady.ask(job);
    if (now?.status === 'done') return;
    if (now?.status === 'cancelled') throw new Error(`job ${now.id} was cancelled by nobody`);
    if (now?.status === 'failed') {
      if (!now.fault?.startsWith('The computation stopped')) throw new Error(String(now.fault));
      script.startedAgain++;
      const isOpen = async () => (await job())?.status !== 'failed';
      await script.steady.settle(isOpen, () => api.post(`jobs/${now.id}/retry`, {}));
    }
    await pause(100);
  }
}

async function answer(script: Script, api: Api, survey: InventedSurvey, surveyId: string) {
  const { steady } = script;
  const { name } = survey;
  const population = await steady.settle(
    async () => {
      const { populations } = await api.read<{ populations: PopulationView[] }>('populations');
      return populations.find((one) => one.name === name);
    },
    () => api.post('populations', populationBody(name)),
  );
  const { key } = await steady.settle(
    async () => {
      const { analyses } = await api.read<{ analyses: AnalysisView[] }>('analyses');
      return analyses.find((one) => one.name === name);
    },
    () => api.post('analyses', analysisBody(name, [surveyId], population.id)),
  );
  const runOf = async () => {
    const { runs } = await api.read<{ runs: RunSummary[] }>(`analyses/${key}/runs`);
    return runs[0];
  };
  const { id } = await steady.settle(runOf, () => startRun(api, key));
  await finish(script, api, async () => (await runOf()).job);
  return id;
}

async function release(script: Script, staff: Staff, title: string, runId: string): Promise<void> {
  const { steady } = script;
  const { author, owner, statistician } = staff;
  const freeze = `runs/${runId}/freeze`;
  await steady.settle(
    async () => (await author.read<{ frozen: unknown }>(freeze)).frozen,
    () => author.post(freeze, { reason: 'Not calibrated: a rehearsal' }),
  );
  const { id } = await steady.settle(
    async () => {
      const { releases } = await author.read<{ releases: ReleaseView[] }>('releases');
      return releases.find((one) => one.title === title);
    },
    () => author.post('releases', { title, authors: [{ name: 'Nobody' }], runIds: [runId] }),
  );
  const read = () => owner.read<ReleaseView>(`releases/${id}`);
  await steady.settle(
    async () => (await read()).signedOff,
    () => statistician.post(`releases/${id}/sign-off`, {}),
  );
  await steady.settle(
    async () => (await read()).agreed,
    () => owner.post(`releases/${id}/agree`, {}),
  );
  await finish(script, owner, async () => (await read()).job as JobView | null);
  await steady.settle(
    async () => (await read()).published,
    () => owner.post(`releases/${id}/publish`, {}),
  );
}

async function doSurvey(script: Script, staff: Staff, index: number): Promise<void> {
  const { steady } = script;
  const { owner } = staff;
  const survey = surveyNumber(index);
  const { slug, name } = survey;
  const find = async () => {
    const { surveys } = await owner.read<{ surveys: { id: string; slug: string }[] }>('surveys');
    return surveys.find((one) => one.slug === slug);
  };
  const { id } = await steady.settle(find, () => owner.post('surveys', surveyBody(survey)));
  await bringIn(steady, owner, survey);
  const job = async () => (await owner.read<{ mapJob: JobView | null }>(`surveys/${slug}`)).mapJob;
  await finish(script, owner, job);
  await release(script, staff, name, await answer(script, owner, survey, id));
}

/** Surveys from files to a published release, two at a time, by people who bear outages. */
export async function workThrough(staff: Staff, surveys: number): Promise<Script> {
  const script: Script = { steady: new Steady(), startedAgain: 0 };
  let next = 0;
  const lane = async () => {
    while (next < surveys) await doSurvey(script, staff, ++next);
  };
  await Promise.all([lane(), lane()]);
  return script;
}
