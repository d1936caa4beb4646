import type { Actor } from '@/lib/access/actor';
import { Conflict, NotFound } from '@/lib/errors';
import type { LatexStyle } from '@/lib/formats';
import { runResultSchema } from '@/lib/schemas/runs';
import { AnalysisRow, inTransaction, PopulationRow } from '@/models';
import { recordAudit } from './audit';
import {
  type FinishedRun,
  STATE,
  writeLimitsCsv,
  writeLimitsTable,
  writePosteriorCsv,
} from './export-limits';
import { findRun, getRun } from './runs';

export interface ExportFile {
  fileName: string;
  contentType: string;
  text: string;
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
  return {
    analysis: `A-${analysis.number}`,
    number,
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
export const exportName = ({ analysis, number }: FinishedRun, file: string) =>
  `${analysis}-run-${number}-${file}`;

/** Notes in the log that a file of a run went out. */
export async function recordExport(actor: Actor, runId: string, fileName: string): Promise<void> {
  await inTransaction((transaction) =>
    recordAudit(actor, 'export', { kind: 'run', id: runId }, `exported ${fileName}`, transaction),
  );
}

async function writeEverything(actor: Actor, id: string, run: FinishedRun): Promise<string> {
  const { job: _job, ...view } = await getRun(actor, id);
  return `${JSON.stringify({ state: STATE, ...view, population: run.population }, null, 1)}\n`;
}

/** One of the files that text alone makes; the figure is drawn by the route. */
export async function exportRun(
  actor: Actor,
  id: string,
  file: string,
  style: LatexStyle = 'deluxetable',
): Promise<ExportFile> {
  const run = await getFinishedRun(actor, id);
  const writers: Record<string, [contentType: string, write: () => string | Promise<string>]> = {
    'limits.csv': ['text/csv; charset=utf-8', () => writeLimitsCsv(run)],
    'posterior.csv': ['text/csv; charset=utf-8', () => writePosteriorCsv(run)],
    'limits.tex': ['application/x-tex; charset=utf-8', () => writeLimitsTable(run, style)],
    'run.json': ['application/json', () => writeEverything(actor, id, run)],
  };
  const found = Object.hasOwn(writers, file) ? writers[file] : undefined;
  if (!found) throw new NotFound('export');
  const [contentType, write] = found;
  const text = await write();
  const fileName = exportName(run, file);
  await recordExport(actor, id, fileName);
  return { fileName, contentType, text };
}
