import type { Actor } from '@/lib/access/actor';
import { Conflict, InputError, NotFound } from '@/lib/errors';
import { bytesOf, type WrittenBytes } from '@/lib/formats';
import type { ExportList } from '@/lib/schemas/exports';
import { runResultSchema } from '@/lib/schemas/runs';
import { AnalysisRow, inTransaction, PopulationRow } from '@/models';
import { recordAudit } from './audit';
import { type FinishedRun, standingOf, stateOf } from './export-limits';
import {
  type AskedOptions,
  defaultOptions,
  findRunExport,
  runExports,
  withDefaults,
} from './exports/registry';
import { releaseOfRun } from './releases/facts';
import { readRunFacts } from './run-facts';
import { findRun, getRun } from './runs';

export interface ExportFile {
  fileName: string;
  contentType: string;
  content: WrittenBytes;
}

/** A finished run with its population; an unfinished one has nothing to export. */
export async function getFinishedRun(actor: Actor, id: string): Promise<FinishedRun> {
  const run = await findRun(actor, id);
  const { inputs, result, resultDigest, recipe, number, engineVersion } = run;
  if (!inputs || !result || !resultDigest) {
    throw new Conflict('This run has no result: there is nothing to export');
  }
  const analysis = await AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true });
  const population = await PopulationRow.findByPk(recipe.populationId, { rejectOnEmpty: true });
  const facts = (await readRunFacts([analysis.id])).find((fact) => fact.id === run.id);
  return {
    id: run.id,
    collaborationId: run.collaborationId,
    analysis: `A-${analysis.number}`,
    analysisName: analysis.name,
    number,
    seed: run.seed,
    finishedAt: run.finishedAt?.toISOString() ?? null,
    inputsDigest: run.inputsDigest,
    hasOlderInputs: facts?.hasOlderInputs ?? false,
    isFrozen: facts?.frozen != null,
    release: facts?.frozen ? await releaseOfRun(run.id) : undefined,
    recipe,
    population: population.definition,
    inputs,
    // A result from before a field existed says so in the field's own words.
    result: runResultSchema.parse(result),
    resultDigest,
    engineVersion,
  };
}

/** "A-31-run-18-limits.csv". */
export const exportName = (
  { analysis, number }: Pick<FinishedRun, 'analysis' | 'number'>,
  file: string,
) => `${analysis}-run-${number}-${file}`;

/** Notes in the log that a file of a run went out. */
export async function recordExport(actor: Actor, runId: string, fileName: string): Promise<void> {
  await inTransaction((transaction) =>
    recordAudit(actor, 'export', { kind: 'run', id: runId }, `exported ${fileName}`, transaction),
  );
}

const EVERYTHING = {
  name: 'run.json',
  group: 'words',
  what: 'Everything: recipe, inputs, result, fingerprints',
  format: 'JSON',
  audience: 'programs',
  mediaType: 'application/json',
} as const;

async function writeEverything(actor: Actor, id: string, run: FinishedRun): Promise<WrittenBytes> {
  const { job: _job, ...view } = await getRun(actor, id);
  const everything = { state: stateOf(run), ...view, population: run.population };
  return bytesOf(new TextEncoder().encode(`${JSON.stringify(everything, null, 1)}\n`));
}

/** What a run offers, and what it cannot and why; sizes are known where no table has to be made. */
export async function listExports(actor: Actor, id: string): Promise<ExportList> {
  const run = await getFinishedRun(actor, id);
  const files: ExportList['files'] = [];
  for (const { make, ...file } of runExports) {
    // The length of an archive of maps follows from its shape: none of them is read for it.
    const size =
      file.group === 'maps' && !file.name.endsWith('.json')
        ? (await make(run, defaultOptions)).size
        : null;
    files.push({ ...file, byteLength: size });
  }
  return {
    state: standingOf(run),
    files: [...files, { ...EVERYTHING, byteLength: null }],
    missing: [
      {
        name: 'samples',
        reason:
          'This run draws no samples: its posterior is an integral. Take posterior.* instead.',
      },
    ],
  };
}

/** One of a run's files; a drawing is made by the route. */
export async function exportRun(
  actor: Actor,
  id: string,
  file: string,
  options: AskedOptions = {},
): Promise<ExportFile> {
  const run = await getFinishedRun(actor, id);
  const found = findRunExport(file);
  if (!found && file !== EVERYTHING.name) throw new NotFound('export');
  const content = await (found
    ? found.make(run, withDefaults(options)).catch(asRefusal)
    : writeEverything(actor, id, run));
  const fileName = exportName(run, file);
  await recordExport(actor, id, fileName);
  return { fileName, contentType: (found ?? EVERYTHING).mediaType, content };
}

/** What a container cannot hold is for the person to know. */
export function asRefusal(error: unknown): never {
  if (error instanceof RangeError) {
    throw new InputError({
      code: 'not-writable',
      message: `This file cannot be made: ${error.message}`,
    });
  }
  throw error;
}
