import { complete, hold, reportProgress } from '@/lib/queue/attempt';
import { type JobPayload, jobKinds } from '@/lib/queue/kinds';
import { inTransaction } from '@/models';
import { type MapPlan, planMaps, type WantedMap } from '@/models/map-plan';
import type { CompletedMap } from '../compute/complete-maps';
import { inLanes } from '../lanes';
import { Stopped, type Work } from '../perform';
import { completeStars } from './complete-stars';
import { linkMaps, markFailed, markWaiting, storeMaps } from './map-store';

/** Few enough that progress is seen and a cancel is quick, enough that threads are not idle. */
const STARS_PER_TASK = 4;
const STAGE = 'maps';

/**
 * Computes the maps that a survey's targets should have and do not.
 *
 * Each finished task is stored at once, behind the fence, so a worker that dies loses at most what
 * its threads were at. Before it ends the job looks again: what was imported meanwhile is done too.
 */
export async function performComputeMaps(work: Work): Promise<void> {
  const failed = new Map<string, string>();
  for (;;) {
    const { attempt } = work;
    const plan = await inTransaction(async (transaction) => {
      const { payload } = await hold(transaction, attempt);
      const parsed = jobKinds['compute-maps'].parse(payload);
      const found = await preparePlan(work, parsed, failed, transaction);
      if (found.missing.length === 0) await complete(transaction, attempt);
      return found;
    });
    if (plan.missing.length === 0) return;
    await computeMissing(work, plan, failed);
  }
}

/** The same of one survey within another job, which goes on afterwards. */
export async function completeSurvey(work: Work, asked: JobPayload<'compute-maps'>): Promise<void> {
  const failed = new Map<string, string>();
  for (;;) {
    const plan = await inTransaction(async (transaction) => {
      await hold(transaction, work.attempt);
      return preparePlan(work, asked, failed, transaction);
    });
    if (plan.missing.length === 0) return;
    await computeMissing(work, plan, failed);
  }
}

async function preparePlan(
  { attempt }: Work,
  { surveyId, targetIds }: JobPayload<'compute-maps'>,
  failed: Map<string, string>,
  transaction: Parameters<typeof hold>[0],
): Promise<MapPlan> {
  const { collaborationId } = attempt;
  const plan = await planMaps({ collaborationId, surveyId, targetIds }, transaction);
  await markFailed(plan.faults, transaction);
  await linkMaps(collaborationId, plan.reusable, transaction);
  const missing = plan.missing.filter(({ digest }) => !failed.has(digest));
  await markWaiting(
    missing.map(({ targetId }) => targetId),
    transaction,
  );
  await reportProgress(attempt, STAGE, plan.total - missing.length, plan.total, transaction);
  return { ...plan, missing };
}

async function computeMissing(
  work: Work,
  plan: MapPlan,
  failed: Map<string, string>,
): Promise<void> {
  // Two targets with the same inputs share one map.
  const groups = new Map<string, WantedMap[]>();
  for (const map of plan.missing) groups.set(map.digest, [...(groups.get(map.digest) ?? []), map]);
  const batches: WantedMap[][][] = [];
  for (const group of groups.values()) {
    const last = batches.at(-1);
    if (last && last.length < STARS_PER_TASK) last.push(group);
    else batches.push([group]);
  }
  let done = plan.total - plan.missing.length;
  await inLanes(batches, work.pool.threads + 1, async (batch) => {
    const stars = batch.map(([{ star }]) => star);
    const answers = await completeStars(work, plan.recipe, plan.recipe.grid, stars);
    // Counted where the row is locked, so that progress never runs backwards.
    await storeBatch(work, plan, batch, answers, failed, () => {
      done += batch.flat().length;
      return done;
    });
  });
}

async function storeBatch(
  { attempt }: Work,
  { recipe, total }: MapPlan,
  batch: WantedMap[][],
  answers: CompletedMap[],
  failed: Map<string, string>,
  countDone: () => number,
): Promise<void> {
  const { collaborationId } = attempt;
  const cancelled = await inTransaction(async (transaction) => {
    const { cancelRequested } = await hold(transaction, attempt);
    const ready = batch.flatMap((group, i) => {
      const answer = answers[i];
      return 'fault' in answer ? [] : [{ group, answer }];
    });
    await storeMaps(
      collaborationId,
      ready.map(({ group: [{ digest, inputs, name }], answer }) => ({
        ...recipe.grid,
        digest,
        encoded: answer.encoded,
        inputs: { ...inputs, star: name, coolingName: recipe.coolingName },
        report: answer.report,
      })),
      transaction,
    );
    await linkMaps(
      collaborationId,
      ready.flatMap(({ group }) => group),
      transaction,
    );
    const faults = batch.flatMap((group, i) => {
      const answer = answers[i];
      return 'fault' in answer ? group.map((map) => ({ ...map, fault: answer.fault })) : [];
    });
    for (const { digest, fault } of faults) failed.set(digest, fault);
    await markFailed(faults, transaction);
    await reportProgress(attempt, STAGE, countDone(), total, transaction);
    return cancelRequested;
  });
  if (cancelled) throw new Stopped('cancelled');
}
