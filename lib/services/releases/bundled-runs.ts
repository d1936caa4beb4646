import type { Actor } from '@/lib/access/actor';
import { Conflict } from '@/lib/errors';
import { citeAsBibtex, unpackFiles } from '@/lib/formats/bundle';
import { type BundleRecipe, bundleRecipeSchema } from '@/lib/schemas/bundles';
import { AnalysisRow, FrozenRunRow, inTransaction } from '@/models';
import { runsInBundle, writeContent } from '@/models/bundle-files';
import { recordAudit } from '../audit';
import { type ReleaseFacts, standingOf } from '../export-limits';
import { getFinishedRun } from '../exports';
import { findRun } from '../runs';
import { type BundledRun, writeBundle } from './bundle';
import { collectContent } from './collect-bundle';

/** The files of a frozen run as they were kept with it, by their paths below its folder. */
async function keptContent(runId: string): Promise<Map<string, Buffer> | null> {
  const frozen = await FrozenRunRow.findOne({ where: { runId } });
  if (!frozen) return null;
  const files = await unpackFiles(frozen.snapshot);
  const [folder] = runsInBundle(files);
  return new Map([...files].map(([path, bytes]) => [path.slice(folder.length + 1), bytes]));
}

function readRecipe(content: ReadonlyMap<string, Buffer>): BundleRecipe {
  const bytes = content.get('recipe.json');
  if (!bytes) throw new Error('a kept run has no recipe');
  return bundleRecipeSchema.parse(JSON.parse(bytes.toString('utf8')));
}

/**
 * A finished run with everything that a bundle holds of it: as it was frozen, else as it stands.
 *
 * @throws Conflict for a run without a result, or a draft whose inputs have changed since
 */
export async function bundledRun(
  actor: Actor,
  runId: string,
  release?: ReleaseFacts,
): Promise<BundledRun> {
  const finished = await getFinishedRun(actor, runId);
  const content = (await keptContent(runId)) ?? (await draftContent(actor, runId));
  const { run: made } = readRecipe(content);
  return {
    folder: `${finished.analysis}-run-${finished.number}`,
    run: { ...finished, release: release ?? finished.release },
    by: made.by,
    startedAt: made.startedAt,
    content,
  };
}

async function draftContent(actor: Actor, runId: string): Promise<Map<string, Buffer>> {
  const run = await findRun(actor, runId);
  const { number, name } = await AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true });
  const finished = await getFinishedRun(actor, runId);
  if (finished.hasOlderInputs) {
    throw new Conflict(
      'The inputs of this run have changed since it was made: a bundle of it could not be computed again. Run the analysis again',
    );
  }
  const content = await inTransaction((transaction) =>
    collectContent(run, `draft, run ${run.number}`, { number, name }, transaction),
  );
  return writeContent(content);
}

/** What the bundle of one run says of its standing; of a frozen one with the digest of what was kept. */
async function bundleState({ run }: BundledRun): Promise<string> {
  const { release, number } = run;
  if (!run.isFrozen) return `Draft, run ${number}: it may change, and nobody has agreed to it.`;
  const frozen = await FrozenRunRow.findOne({
    attributes: ['snapshotSha256'],
    where: { runId: run.id },
    rejectOnEmpty: true,
  });
  const kept = `kept with its inputs for good (SHA-256 of what was kept: ${frozen.snapshotSha256})`;
  return release
    ? `Frozen, run ${number}, ${kept}, and published as ${standingOf(run)}, ${release.address}.`
    : `Frozen, run ${number}, ${kept}; it is not published.`;
}

/** The bundle of any finished run, which says how the run stands. */
export async function exportRunBundle(actor: Actor, runId: string) {
  const bundled = await bundledRun(actor, runId);
  const { run, folder } = bundled;
  const name = `${run.analysisName} (${run.analysis}, run ${run.number})`;
  const author = { name: bundled.by ?? actor.personName };
  const at = run.finishedAt ?? bundled.startedAt;
  const bytes = await writeBundle(
    {
      name,
      description: `${run.result.statement.sentence}.`,
      state: await bundleState(bundled),
      datePublished: at.slice(0, 10),
      licence: null,
      authors: [author],
      bibtex: citeAsBibtex({
        key: folder,
        title: name,
        authors: [author],
        year: Number(at.slice(0, 4)),
        version: standingOf(run),
        fingerprint: run.resultDigest,
        address: run.release?.address ?? 'unpublished',
      }),
    },
    [bundled],
  );
  const fileName = `${folder}-${run.isFrozen ? 'frozen' : 'draft'}.zip`;
  await inTransaction((transaction) =>
    recordAudit(actor, 'export', { kind: 'run', id: runId }, `exported ${fileName}`, transaction),
  );
  return { fileName, bytes };
}
