import { readdirSync, utimesSync } from 'node:fs';
import path from 'node:path';
import { createRandom } from '@/lib/numerics/random';
import { found } from '../founders';
import { oneSurvey } from '../invented-sky';
import { keptFacts, missingFrom } from '../kept-facts';
import type { Bench, Laboratory, Measured, Row } from '../row';
import { type Script, type Staff, workThrough } from '../scripted-work';
import { filesOf, pause, surveyBody } from '../work';

const ROLES = ['owner', 'author', 'statistician'] as const;
/** The web server twice: uploads, imports and steps of releases are its work. */
const VICTIMS = ['worker-1', 'worker-2', 'web', 'web', 'postgres'];
const LEAST_KILLS = 10;
const surveyCount = () => Number(process.env.HARDEN_SURVEYS ?? 6);
const seed = () => process.env.HARDEN_SEED ?? 'moments 1';

type Kills = Record<string, number>;

const answers = async ({ address }: Laboratory) => {
  try {
    return (await fetch(`${address}/api/health`)).ok;
  } catch {
    return false;
  }
};

/**
 * Kills a service at random moments until the work is over; each time everything is up again first,
 * or a slow machine would never get anywhere.
 */
async function killAtRandom(laboratory: Laboratory, work: Promise<unknown>): Promise<Kills> {
  const { uniform } = createRandom(seed());
  const kills: Kills = {};
  let isOver = false;
  const over = work.then(
    () => undefined,
    () => undefined,
  );
  over.then(() => {
    isOver = true;
  });
  for (;;) {
    while (!isOver && !(await answers(laboratory))) await pause(50);
    await Promise.race([pause(3000 * uniform()), over]);
    if (isOver) return kills;
    const victim = VICTIMS[Math.floor(VICTIMS.length * uniform())];
    if (await laboratory.kill(victim)) kills[victim] = (kills[victim] ?? 0) + 1;
  }
}

/** Files of uploads that were cut off, before and after the sweep that the next upload makes. */
async function sweepOrphans({ folder }: Laboratory, { owner }: Staff) {
  const incoming = path.join(folder, 'incoming');
  const before = readdirSync(incoming);
  const longAgo = new Date(Date.now() - 2 * 3_600_000);
  for (const name of before) utimesSync(path.join(incoming, name), longAgo, longAgo);
  const survey = oneSurvey('SWEEP', 1);
  await owner.post('surveys', surveyBody(survey));
  const [{ kind, name, bytes }] = filesOf(survey, 2);
  await owner.upload(kind, survey.slug, name, bytes);
  return { before: before.length, after: readdirSync(incoming).length };
}

interface Outcome {
  facts: string[];
  seconds: number;
  script: Script;
  kills: Kills;
  orphans: { before: number; after: number };
  badPages: number;
}

async function live({ laboratory: open, say }: Bench, isDisturbed: boolean): Promise<Outcome> {
  const laboratory = await open({ workers: 2, web: true });
  const { as } = await found(laboratory, ROLES);
  const start = Date.now();
  const work = workThrough(as, surveyCount());
  const [script, kills] = await Promise.all([
    work,
    isDisturbed ? killAtRandom(laboratory, work) : {},
  ]);
  const seconds = Math.round((Date.now() - start) / 1000);
  const facts = await keptFacts(laboratory.databaseUrl);
  const orphans = await script.steady.ask(() => sweepOrphans(laboratory, as));
  const badPages = await laboratory.stopAndCheck();
  await laboratory.close();
  say(`${facts.length} things after ${seconds} s, kills: ${JSON.stringify(kills)}`);
  return { facts, seconds, script, kills, orphans, badPages };
}

async function measure(bench: Bench): Promise<Measured> {
  const calm = await live(bench, false);
  const disturbed = await live(bench, true);
  const lost = missingFrom(disturbed.facts, calm.facts);
  const doubled = missingFrom(calm.facts, disturbed.facts);
  const { script, kills, orphans, badPages } = disturbed;
  const total = Object.values(kills).reduce((sum, count) => sum + count, 0);
  const { outages, wrong } = script.steady;
  const words = Object.entries(kills).map(([service, count]) => `${service} ${count}`);
  return {
    isMet:
      lost.length + doubled.length + wrong.length + badPages + orphans.after === 0 &&
      calm.script.steady.outages === 0 &&
      total >= LEAST_KILLS,
    figure:
      `${total} kills in ${disturbed.seconds} s (${words.join(', ')}; ${calm.seconds} s undisturbed): ` +
      `of ${calm.facts.length} things ${lost.length} lost or other, ${doubled.length} too many; ` +
      `${outages} requests met an outage, ${wrong.length} a wrong answer; ${script.startedAgain} jobs ` +
      `started again by hand; ${orphans.before} cut uploads swept to ${orphans.after}; ` +
      `${badPages} bad checksums`,
    details: { kills, calmS: calm.seconds, disturbedS: disturbed.seconds, outages, lost, doubled },
    notes: [
      ...lost.slice(0, 5).map((line) => `lost: ${line}`),
      ...doubled.slice(0, 5).map((line) => `too many: ${line}`),
      ...wrong.slice(0, 5),
    ],
  };
}

export const row: Row = {
  name: 'fault-moments',
  what: 'F7: surveys from files to published releases while web, workers and database are killed at random moments',
  goal: `at least ${LEAST_KILLS} kills; every thing with the digests of an undisturbed run, once; no answer but 503; nothing orphaned after the sweep; 0 bad checksums`,
  measure,
};
