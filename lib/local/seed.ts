import { type ChildProcess, spawn } from 'node:child_process';
import { readFile, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { type Actor, EVERY_SCOPE } from '@/lib/access/actor';
import { hashPassword } from '@/lib/access/passwords';
import { config } from '@/lib/config';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import { nameStart } from '@/lib/services/cooling-relations';
import { listCoolingTables } from '@/lib/services/cooling-tables';
import { closeReaders } from '@/lib/services/reading';
import { createSurvey, listSurveys } from '@/lib/services/surveys';
import { createToken } from '@/lib/services/tokens';
import {
  CollaborationRow,
  closeDatabase,
  database,
  inTransaction,
  JobRow,
  MemberRow,
  PersonRow,
} from '@/models';
import { endWithLauncher } from './death-signal.mjs';
import { askQuestions } from './demo/analyses';
import { companionsOf } from './demo/companions';
import { addExercise } from './demo/exercise';
import { companionsFile, coolingFile, curvesFile, targetsFile } from './demo/files';
import { addNeighbours, memberOf, NEIGHBOURS } from './demo/neighbours';
import { demoPeople, makePassword } from './demo/people';
import { releaseLead } from './demo/release';
import { type DemoSurvey, demoSurveys, drawSky } from './demo/sky';
import { addLaterEpochs, bringIn } from './demo/store';

const SLUG = 'breakwater';
const SIGN_INS = 'demo-sign-ins.json';
const say = (text: string) => process.stdout.write(`${text}\n`);

interface SignIn {
  role: string;
  email: string;
  password: string;
}

async function makePeople(): Promise<{ actors: Map<string, Actor>; signIns: SignIn[] }> {
  const signIns: SignIn[] = [];
  const actors = new Map<string, Actor>();
  const made = await Promise.all(
    demoPeople.map(async (person) => {
      const password = makePassword();
      return { person, password, passwordHash: await hashPassword(password) };
    }),
  );
  await inTransaction(async (transaction) => {
    const collaboration = await CollaborationRow.create(
      { slug: SLUG, name: 'Breakwater' },
      { transaction },
    );
    for (const { person, password, passwordHash } of made) {
      const email = `${person.key}@breakwater.example`;
      const row = await PersonRow.create(
        { email, name: person.name, passwordHash },
        { transaction },
      );
      await MemberRow.create(
        { collaborationId: collaboration.id, personId: row.id, roles: person.roles },
        { transaction },
      );
      actors.set(person.key, {
        personId: row.id,
        personName: person.name,
        email,
        collaborationId: collaboration.id,
        collaboration: SLUG,
        roles: person.roles,
        via: 'session',
        scopes: [...EVERY_SCOPE],
      });
      if (person.isShown) signIns.push({ role: person.roles[0], email, password });
    }
  });
  return { actors, signIns };
}

async function finishJob(jobId: string): Promise<void> {
  for (;;) {
    const job = await JobRow.findByPk(jobId);
    if (job?.status === 'done') return;
    if (!job || job.status === 'failed' || job.status === 'cancelled') {
      throw new Error(`job ${jobId} ended without a result: ${job?.fault ?? 'it is gone'}`);
    }
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

/** Invented, with the start that each follows; the surveys use the first. */
const coolingModels = [
  { file: 'hot-harbour.csv', title: 'Harbour, high-entropy start', shift: 0, start: 'hot' },
  { file: 'warm-harbour.csv', title: 'Harbour, medium-entropy start', shift: 0.7, start: 'warm' },
  { file: 'cold-harbour.csv', title: 'Harbour, low-entropy start', shift: 1.4, start: 'cold' },
] as const;

async function bringCooling(owner: Actor): Promise<void> {
  for (const { file, title, shift } of coolingModels) {
    await bringIn(owner, 'cooling-tables', file, coolingFile(shift), undefined, { title });
  }
  for (const { id, name } of await listCoolingTables(owner)) {
    const model = coolingModels.find(({ title }) => title === name);
    if (model) await nameStart(owner, id, { startCondition: model.start });
  }
}

async function importSurvey(
  actor: Actor,
  survey: DemoSurvey,
  stars: ReturnType<typeof drawSky>,
): Promise<string> {
  const own = stars.filter((star) => star.surveys.includes(survey.slug));
  const companions = companionsOf(survey, own);
  const tables = await listCoolingTables(actor);
  const table = tables.find(({ startCondition }) => startCondition === 'hot');
  if (!table) throw new Error('no cooling table of the demonstration starts hot');
  const made = await createSurvey(actor, {
    name: survey.name,
    slug: survey.slug,
    band: survey.band,
    description: survey.description,
    observedFrom: survey.from,
    observedTo: survey.to,
    mapSettings: mapSettingsSchema.parse({ cooling: { kind: 'table', coolingTableId: table.id } }),
  });
  await bringIn(
    actor,
    'targets',
    `${survey.slug}-targets.csv`,
    targetsFile(survey, own),
    survey.slug,
  );
  await bringIn(
    actor,
    'contrast-curves',
    `${survey.slug}-curves.csv`,
    curvesFile(survey, own),
    survey.slug,
  );
  const job = await JobRow.findOne({
    where: { surveyId: made.id },
    order: [['createdAt', 'DESC']],
  });
  if (!job) throw new Error(`the curves of ${survey.name} started no maps`);
  await finishJob(job.id);
  await bringIn(
    actor,
    'companions',
    `${survey.slug}-companions.csv`,
    companionsFile(companions),
    survey.slug,
  );
  await addLaterEpochs(actor, survey.slug, companions);
  say(`${survey.name}: ${own.length} targets, maps computed`);
  return made.id;
}

function startWorker(): ChildProcess {
  const script = path.resolve(config().bundleDirectory, 'workers/main.js');
  const [command, ...args] = endWithLauncher(
    [process.execPath, '--enable-source-maps', script],
    'TERM',
  );
  return spawn(command, args, { env: { ...process.env }, stdio: ['ignore', 'ignore', 'inherit'] });
}

async function writeSecret(name: string, text: string): Promise<void> {
  await writeFile(path.join(config().dataDirectory, name), text, { mode: 0o600 });
}

/** An earlier start that was stopped in the middle leaves parts; they go before a new beginning. */
async function removeHalfMade(collaboration: CollaborationRow): Promise<void> {
  await inTransaction(async (transaction) => {
    await collaboration.destroy({ transaction });
    const emails = demoPeople.map((person) => `${person.key}@breakwater.example`);
    await PersonRow.destroy({ where: { email: emails }, transaction });
  });
}

const areNeighboursThere = async () =>
  (await CollaborationRow.findOne({ where: { slug: NEIGHBOURS.slug } }))?.settings
    .isDemonstrationReady === true;

/** The second collaboration is made by itself, so that an older demonstration gets it too. */
async function seedNeighbours(): Promise<void> {
  if (await areNeighboursThere()) return;
  await CollaborationRow.destroy({ where: { slug: NEIGHBOURS.slug } });
  await PersonRow.destroy({ where: { email: NEIGHBOURS.email } });
  const host = await memberOf(SLUG, 'marrand@breakwater.example');
  const signIn = await addNeighbours(host, drawSky(), finishJob);
  const file = path.join(config().dataDirectory, SIGN_INS);
  const others: SignIn[] = JSON.parse(await readFile(file, 'utf8'));
  const signIns = [...others.filter(({ email }) => email !== signIn.email), signIn];
  await writeSecret(SIGN_INS, `${JSON.stringify(signIns, null, 2)}\n`);
  await CollaborationRow.update(
    { settings: { isDemonstrationReady: true } },
    { where: { slug: NEIGHBOURS.slug } },
  );
  say('a second collaboration shares a survey with it, and offers another');
}

/** The exercise computes nothing, so that an older demonstration gets it too. */
async function seedExercise(): Promise<void> {
  const { settings } = await CollaborationRow.findOne({
    where: { slug: SLUG },
    rejectOnEmpty: true,
  });
  if (typeof settings.leadAnalysisId !== 'string') return;
  const statistician = await memberOf(SLUG, 'linhart@breakwater.example');
  const student = await memberOf(SLUG, 'hadley@breakwater.example');
  await addExercise(statistician, student, settings.leadAnalysisId);
}

async function seed(): Promise<void> {
  database();
  const known = await CollaborationRow.findOne({ where: { slug: SLUG } });
  const isReady = known?.settings.isDemonstrationReady === true;
  if (isReady) await seedExercise();
  if (isReady && (await areNeighboursThere())) {
    say('the demonstration is there already');
    return;
  }
  if (known && !isReady) await removeHalfMade(known);
  const worker = startWorker();
  const ended = new Promise<void>((resolve) => worker.once('exit', () => resolve()));
  try {
    if (!isReady) {
      await seedBreakwater();
      await seedExercise();
    }
    await seedNeighbours();
  } finally {
    worker.kill('SIGTERM');
    await ended;
  }
}

async function seedBreakwater(): Promise<void> {
  const { actors, signIns } = await makePeople();
  const actorOf = (key: string) => {
    const actor = actors.get(key);
    if (!actor) throw new Error(`nobody is called ${key}`);
    return actor;
  };
  await bringCooling(actorOf('marrand'));
  const stars = drawSky();
  const ids: Record<string, string> = {};
  for (const survey of demoSurveys)
    ids[survey.slug] = await importSurvey(actorOf(survey.lead), survey, stars);
  const { leadAnalysisId } = await askQuestions({
    actors: { statistician: actorOf('linhart'), student: actorOf('hadley') },
    surveyIds: ids as never,
    finish: finishJob,
  });
  await releaseLead({
    actors: {
      author: actorOf('castellan'),
      statistician: actorOf('linhart'),
      owner: actorOf('marrand'),
    },
    analysisId: leadAnalysisId,
    finish: finishJob,
  });
  const { token } = await createToken(actorOf('linhart'), {
    name: 'Demonstration',
    scopes: ['read', 'write', 'run'],
    days: 365,
  });
  await writeSecret('demo-token', `${token}\n`);
  await writeSecret(SIGN_INS, `${JSON.stringify(signIns, null, 2)}\n`);
  await CollaborationRow.update(
    { settings: { isDemonstrationReady: true, leadAnalysisId } },
    { where: { slug: SLUG } },
  );
  const { stars: count, entries } = await listSurveys(actorOf('marrand'));
  say(`${count} stars in ${entries} entries, and the demonstration's analyses, are ready`);
}

seed()
  .catch((error: unknown) => {
    process.stderr.write(
      `${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`,
    );
    process.exitCode = 1;
  })
  .finally(async () => {
    await closeReaders();
    await closeDatabase();
  });
