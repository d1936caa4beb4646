import { NotFound } from '@/lib/errors';
import { unpackFiles } from '@/lib/formats/bundle';
import { complete, hold, reportProgress } from '@/lib/queue/attempt';
import { select } from '@/lib/queue/statement';
import type { ReleaseCheck } from '@/lib/schemas/releases';
import type { RunResult } from '@/lib/schemas/runs';
import { ENGINE_VERSION } from '@/lib/sensitivity';
import { FrozenRunRow, inTransaction, ReleaseRow, RunRow } from '@/models';
import { readContent, runsInBundle } from '@/models/bundle-files';
import { digestOf } from '@/models/digest';
import { enginesOfRun, refreshWords } from '@/models/engines-of-run';
import type { Work } from '../perform';
import { computeBundle } from './bundle-run';
import { CHECKED_DIGITS, findDifferences } from './run-difference';

/** Differences that the release states; the count tells of the rest. */
const MOST_LISTED = 5;

interface Named {
  run_id: string;
  name: string;
}

/**
 * Runs everything in a release again from the inputs that were frozen with it, and compares every
 * number of every result. Whether they agree is the job's result; a difference is no failure of it.
 */
export async function performVerifyRelease(work: Work): Promise<void> {
  const { attempt } = work;
  const { collaborationId, jobId } = attempt;
  await reportProgress(attempt, 'collect', 0, 1);
  const release = await ReleaseRow.findOne({ where: { jobId, collaborationId } });
  if (!release) throw new NotFound('release for this job');
  const named = await select<Named>(
    `select q.run_id, 'A-' || a.number || ', run ' || r.number as name
       from release_run q join run r on r.id = q.run_id join analysis a on a.id = r.analysis_id
      where q.release_id = $1 order by q.position`,
    [release.id],
  );
  const runs: ReleaseCheck['runs'] = [];
  for (const { run_id: runId, name } of named) runs.push(await verifyRun(work, runId, name));
  const verification: ReleaseCheck = {
    isSame: runs.every(({ isSame }) => isSame),
    digits: CHECKED_DIGITS,
    runs,
    engineVersion: ENGINE_VERSION,
    checkedAt: new Date().toISOString(),
  };
  await inTransaction(async (transaction) => {
    await hold(transaction, attempt);
    await release.update({ verification }, { transaction });
    await reportProgress(attempt, 'store', 1, 1, transaction);
    await complete(transaction, attempt);
  });
}

async function verifyRun(
  work: Work,
  runId: string,
  name: string,
): Promise<ReleaseCheck['runs'][number]> {
  const { attempt } = work;
  const [frozen, run] = await Promise.all([
    FrozenRunRow.findOne({ where: { runId }, rejectOnEmpty: true }),
    RunRow.findByPk(runId, { rejectOnEmpty: true }),
  ]);
  const files = await unpackFiles(frozen.snapshot);
  const content = readContent(files, runsInBundle(files)[0]);
  const again = await computeBundle(work, content, {
    maps: (done, total) => reportProgress(attempt, 'maps', done, total),
    enter(stage, total) {
      work.signal.throwIfAborted();
      return reportProgress(attempt, stage, 0, total);
    },
  });
  const stored = run.result as RunResult;
  const differences = findDifferences(stored, again.result);
  return {
    runId,
    name,
    isSame: differences.length === 0,
    isSameDigest: digestOf(again.result) === run.resultDigest,
    limit: again.result.answer.limit,
    differences: differences.slice(0, MOST_LISTED),
    differenceCount: differences.length,
    cause: differences.length === 0 ? null : await engineCause(run),
  };
}

/** Maps that another engine made are made anew by the check, and differ: which, and what helps. */
async function engineCause(run: RunRow): Promise<string | null> {
  const engines = await enginesOfRun(run);
  if (engines.every((engine) => engine === ENGINE_VERSION)) return null;
  const surveys = run.inputs?.surveys.map(({ name }) => name) ?? [];
  return (
    `Its maps are of engine ${engines.join(' and ')}, and the check makes them with engine ` +
    `${ENGINE_VERSION}. ${refreshWords(surveys)} and put it into the release in place of this one`
  );
}
