import { randomUUID } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { DatabaseError, QueryTypes, type Transaction, ValidationError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, InputError } from '@/lib/errors';
import { bundleLimits, unpackFiles } from '@/lib/formats/bundle';
import { enqueueRecreation } from '@/lib/queue/enqueue';
import { select } from '@/lib/queue/statement';
import type { BundleContent, BundleImportView } from '@/lib/schemas/bundles';
import {
  AnalysisRow,
  BundleImportRow,
  database,
  inTransaction,
  JobRow,
  PersonRow,
  RunRow,
} from '@/models';
import { readContent, runsInBundle } from '@/models/bundle-files';
import { idsOf, underOtherIds } from '@/models/bundle-rows';
import { portableDigests } from '@/models/portable-digest';
import { recordAudit } from '../audit';
import { receiveFile } from '../incoming-file';
import { storeBundle } from './store-bundle';

const IDS_IN_USE = `
  select exists (
    select id from survey where id = any($1::uuid[])
    union all select id from target where id = any($1::uuid[])
    union all select id from star where id = any($1::uuid[])
    union all select id from contrast_curve where id = any($1::uuid[])
    union all select id from companion where id = any($1::uuid[])
    union all select id from cooling_table where id = any($1::uuid[])
    union all select id from population where id = any($1::uuid[])
    union all select id from sample where id = any($1::uuid[])
    union all select id from combination where id = any($1::uuid[])) as taken`;

/** Under its own ids where the database has none of them, so that digests agree to the last bit. */
async function underFreeIds(
  content: BundleContent,
  transaction: Transaction,
): Promise<BundleContent> {
  const ids = idsOf(content);
  const [{ taken }] = await database().query<{ taken: boolean }>(IDS_IN_USE, {
    bind: [ids],
    type: QueryTypes.SELECT,
    transaction,
  });
  return taken ? underOtherIds(content, new Map(ids.map((id) => [id, randomUUID()]))) : content;
}

const KNOWN = `
  select 'star' as what, name from star
    where collaboration_id = $1 and (folded_name = any($2) or gaia_dr3_id = any($3))
  union all select 'survey', slug from survey where collaboration_id = $1 and slug = any($4)
  union all select 'cooling table', name from cooling_table
    where collaboration_id = $1 and name = any($5)
  limit 5`;

/** Nothing is joined in silence: a bundle comes into a collaboration that has none of its stars. */
async function refuseKnown(
  actor: Actor,
  content: BundleContent,
  foldedNames: string[],
  transaction: Transaction,
): Promise<void> {
  const { stars, recipe, coolingTables } = content;
  const known = await database().query<{ what: string; name: string }>(KNOWN, {
    bind: [
      actor.collaborationId,
      foldedNames,
      stars.flatMap(({ gaiaDr3Id }) => gaiaDr3Id ?? []),
      recipe.surveys.map(({ slug }) => slug),
      coolingTables.map(({ name }) => name),
    ],
    type: QueryTypes.SELECT,
    transaction,
  });
  if (known.length === 0) return;
  const names = known.map(({ what, name }) => `${what} ${name}`).join(', ');
  throw new Conflict(
    `This collaboration has some of the bundle's contents already: ${names}. Bring it into a collaboration of its own, where no star would be counted twice`,
  );
}

function chooseFolder(files: ReadonlyMap<string, Buffer>, asked: string | undefined): string {
  const folders = runsInBundle(files);
  if (folders.length === 0) {
    throw new InputError({
      code: 'no-run',
      item: 'file',
      found: 'no recipe.json',
      expected: 'a bundle that a release or a run gave',
    });
  }
  if (asked !== undefined) {
    if (folders.includes(asked)) return asked;
    throw new InputError({
      code: 'no-run',
      column: 'run',
      found: asked,
      expected: `one of ${folders.join(', ')}`,
    });
  }
  if (folders.length === 1) return folders[0];
  throw new InputError({
    code: 'several-runs',
    item: 'file',
    found: `${folders.length} runs`,
    expected: `the name of one: ${folders.join(', ')}`,
  });
}

/**
 * Makes surveys, population and analysis anew from a bundle and runs it: all of it or nothing.
 *
 * @param asked which run of a bundle that holds several
 * @throws InputError for an archive that is refused; Conflict where something of it is here already
 */
export async function importBundle(
  actor: Actor,
  bytes: Uint8Array,
  fileSha256: string,
  asked: string | undefined,
): Promise<BundleImportView> {
  demand(actor, 'create-survey');
  const files = await unpackFiles(bytes);
  const read = readContent(files, chooseFolder(files, asked));
  const { collaborationId } = actor;
  const stored = inTransaction(async (transaction) => {
    await select(
      'select id from collaboration where id = $1 for update',
      [collaborationId],
      transaction,
    );
    const content = await underFreeIds(read, transaction);
    const { recipe } = content;
    const refuse = (folded: string[]) => refuseKnown(actor, content, folded, transaction);
    const made = await storeBundle(actor, content, refuse, transaction);
    const jobId = await enqueueRecreation(transaction, {
      collaborationId,
      requestedBy: actor.personId,
    });
    const run = await RunRow.create(
      {
        collaborationId,
        analysisId: made.analysis.id,
        number: 1,
        jobId,
        recipe: made.analysis.recipe,
        seed: recipe.run.seed,
        engineVersion: made.engineVersion,
        createdBy: actor.personId,
      },
      { transaction },
    );
    const title = `${recipe.analysis.name} (A-${recipe.analysis.number}, run ${recipe.run.number})`;
    const row = await BundleImportRow.create(
      {
        collaborationId,
        runId: run.id,
        fileSha256,
        title,
        expected: recipe.expected,
        importedBy: actor.personId,
      },
      { transaction },
    );
    const item = { kind: 'run', id: run.id };
    const summary = `brought a bundle in as A-${made.analysis.number}`;
    await recordAudit(actor, 'import-bundle', item, summary, transaction, { fileSha256 });
    return row.id;
  });
  const id = await stored.catch(refuseUnstorable);
  const { imports } = await listImports(actor);
  return imports.find((one) => one.id === id) as BundleImportView;
}

/** What the tables do not take, such as a negative distance, is a fault of the bundle. */
function refuseUnstorable(error: unknown): never {
  if (!(error instanceof DatabaseError || error instanceof ValidationError)) throw error;
  throw new InputError({
    code: 'value',
    item: 'the bundle',
    found: 'a value that cannot be stored, or something twice',
    expected: 'values within the ranges that the laboratory takes',
  });
}

/** The same of a request's body. */
export async function receiveBundle(
  actor: Actor,
  request: Request,
  asked: string | undefined,
): Promise<BundleImportView> {
  demand(actor, 'create-survey');
  const file = await receiveFile(request);
  try {
    if (file.byteLength > bundleLimits.bytes) {
      throw new InputError(
        { code: 'too-large', item: 'file', message: 'has more than 256 MiB; expected fewer' },
        { status: 413 },
      );
    }
    return await importBundle(actor, await readFile(file.path), file.sha256, asked);
  } finally {
    await file.discard();
  }
}

/** What came in with bundles, and whether it gave the same again. */
export async function listImports(actor: Actor): Promise<{ imports: BundleImportView[] }> {
  demand(actor, 'read');
  database();
  const rows = await BundleImportRow.findAll({
    where: { collaborationId: actor.collaborationId },
    order: [['createdAt', 'DESC']],
    limit: 50,
  });
  const runs = await RunRow.findAll({ where: { id: rows.map(({ runId }) => runId) } });
  const [analyses, jobs, people] = await Promise.all([
    AnalysisRow.findAll({ where: { id: runs.map(({ analysisId }) => analysisId) } }),
    JobRow.findAll({ where: { id: runs.map(({ jobId }) => jobId) } }),
    PersonRow.findAll({ where: { id: rows.flatMap(({ importedBy }) => importedBy ?? []) } }),
  ]);
  const imports = rows.flatMap((row): BundleImportView[] => {
    const run = runs.find(({ id }) => id === row.runId);
    const analysis = analyses.find(({ id }) => id === run?.analysisId);
    const job = jobs.find(({ id }) => id === run?.jobId);
    // Deleted between the statements.
    if (!run || !analysis || !job) return [];
    const person = people.find(({ id }) => id === row.importedBy);
    const digests = run.result ? portableDigests(run) : null;
    return [
      {
        id: row.id,
        title: row.title,
        fileSha256: row.fileSha256,
        analysisKey: `A-${analysis.number}`,
        run: { id: run.id, number: run.number },
        status: job.status,
        fault: job.fault,
        agreement:
          digests && run.result
            ? {
                isSameInputs: digests.portableInputs === row.expected.portableInputs,
                isSameResult: digests.portableResult === row.expected.portableResult,
                limit: run.result.answer.limit,
                expectedLimit: row.expected.limit,
              }
            : null,
        importedBy: person?.name ?? null,
        createdAt: row.createdAt.toISOString(),
      },
    ];
  });
  return { imports };
}
