import type { Actor } from '@/lib/access/actor';
import { InputError, NotFound } from '@/lib/errors';
import type { KnownMap, Note, ReadContext, ReadResult, UploadKind } from '@/lib/formats';
import type { UploadReport, UploadSettings } from '@/lib/schemas/uploads';
import { BUILT_IN_LAW_BANDS } from '@/lib/sensitivity';
import { CompletenessMapRow, CoolingTableRow, type SurveyRow, TargetRow } from '@/models';
import { unpackMap } from '@/models/map-values';
import { recallMapping } from './column-memory';
import { planCompanions } from './intake/companions';
import { planCompletenessMaps } from './intake/completeness-maps';
import { planContrastCurves } from './intake/contrast-curves';
import { planCoolingTable } from './intake/cooling-table';
import type { Plan } from './intake/plan';
import { planSystems } from './intake/systems';
import { takeBackWithdrawn } from './intake/take-back';
import { planTargets } from './intake/targets';
import { readOnThread } from './reading';

/** A file on its way in: what it holds, for which survey, and how a person wants it read. */
export interface Source {
  kind: UploadKind;
  fileName: string;
  survey: SurveyRow | null;
  settings: UploadSettings;
}

async function bandsOf(survey: SurveyRow): Promise<string[]> {
  const { cooling } = survey.mapSettings;
  if (cooling.kind === 'built-in') return [...BUILT_IN_LAW_BANDS];
  const table = await CoolingTableRow.findByPk(cooling.coolingTableId);
  return table ? Object.keys(table.magnitudes) : [];
}

async function mapsByName(targets: TargetRow[]): Promise<Map<string, KnownMap>> {
  const rows = await CompletenessMapRow.findAll({
    where: { id: targets.flatMap((target) => (target.mapId ? [target.mapId] : [])) },
  });
  const byId = new Map(rows.map((row) => [row.id, row]));
  const maps = new Map<string, KnownMap>();
  for (const target of targets) {
    const row = target.mapId ? byId.get(target.mapId) : undefined;
    if (!row) continue;
    maps.set(target.name, {
      massMjup: row.massMjup,
      semiMajorAxisAu: row.semiMajorAxisAu,
      completeness: [...unpackMap(row.nodeValues)],
    });
  }
  return maps;
}

async function contextOf(source: Source): Promise<ReadContext> {
  const { survey, settings, kind, fileName } = source;
  const context: ReadContext = {
    fileName,
    kind,
    defaultTarget: settings.defaultTarget,
    notMeasuredIsZero: settings.notMeasuredIsZero,
    columnMap: settings.columnMap,
    leaveOut: settings.leaveOut,
    axes: settings.axes,
  };
  if (!survey || kind === 'targets') return context;
  const targets = await TargetRow.findAll({ where: { surveyId: survey.id } });
  context.targetNames = targets.map((target) => ({
    name: target.name,
    otherNames: target.otherNames,
  }));
  if (kind === 'contrast-curves') {
    context.bands = await bandsOf(survey);
    context.defaultBand = survey.band;
  }
  if (kind === 'companions') context.maps = await mapsByName(targets);
  return context;
}

async function planOf(
  actor: Actor,
  source: Source,
  read: ReadResult & { ok: true },
): Promise<Plan> {
  if (read.kind === 'cooling-tables') {
    const title = source.settings.title ?? source.fileName.replace(/\.[^.]+$/, '');
    return planCoolingTable(actor, title, read.records[0]);
  }
  if (read.kind === 'systems') {
    const { fileName, settings } = source;
    const title = settings.title ?? fileName.replace(/\.[^.]+$/, '');
    const request = { title, fileName, versionOf: settings.versionOf };
    return planSystems(actor, request, read.records[0]);
  }
  if (!source.survey) throw new NotFound('survey');
  const context = { actor, survey: source.survey };
  switch (read.kind) {
    case 'targets':
      return planTargets(context, read.records);
    case 'contrast-curves':
      return planContrastCurves(context, read.records);
    case 'completeness-maps':
      return planCompletenessMaps(context, read.records);
    case 'companions':
      return planCompanions(context, read.records);
  }
}

export interface DryRun {
  plan: Plan;
  report: UploadReport;
  /** Those of the person, and what was remembered of a file with the same headings. */
  settings: UploadSettings;
}

interface Reading {
  read: ReadResult;
  source: Source;
  remembered: { id: string; columnMap: Record<string, string> } | null;
}

/** Where the person has mapped nothing, the mapping of the last file with these headings holds. */
async function readAsBefore(source: Source, bytes: Buffer): Promise<Reading> {
  const read = await readOnThread(bytes, await contextOf(source));
  const isOwn = source.settings.columnMap !== undefined;
  const remembered = isOwn ? null : await recallMapping(source.survey, source.kind, read.columns);
  if (!remembered) return { read, source, remembered };
  const settings = { ...source.settings, columnMap: remembered.columnMap };
  const mapped = { ...source, settings };
  return { read: await readOnThread(bytes, await contextOf(mapped)), source: mapped, remembered };
}

function describeMapping(columnMap: Record<string, string>): Note {
  const words = Object.entries(columnMap).map(([heading, readAs]) =>
    readAs === '' ? `"${heading}" left out` : `"${heading}" as ${readAs}`,
  );
  const message = `Mapped as last time for these headings: ${words.join(', ')}`;
  return { code: 'columns-as-before', level: 'information', message };
}

/**
 * Reads and plans, storing nothing.
 *
 * @throws InputError with every fault and its place
 */
export async function dryRun(actor: Actor, given: Source, bytes: Buffer): Promise<DryRun> {
  const { read, source, remembered } = await readAsBefore(given, bytes);
  if (!read.ok) {
    const faults = read.faults.map((fault) => ({ file: source.fileName, ...fault }));
    // A file that is too large as a whole; an array that is too large inside one has its place.
    const isTooLarge = faults.some(
      ({ code, line, item }) => code === 'too-large' && line === undefined && item === undefined,
    );
    const status = isTooLarge ? 413 : 422;
    const { columns, excerpts, offending } = read;
    const refused = { columns, excerpts, offending, remembered };
    throw new InputError(faults, { status, count: read.faultCount, refused });
  }
  const planned = await planOf(actor, source, read);
  const { survey } = source;
  const isList = survey !== null && source.kind === 'targets';
  const plan = isList ? await takeBackWithdrawn(planned, survey) : planned;
  if (plan.faults.length > 0) {
    throw new InputError(
      plan.faults.slice(0, 100).map((fault) => ({ file: source.fileName, ...fault })),
      {
        count: plan.faults.length,
        refused: { columns: read.columns, excerpts: [], offending: null, remembered },
      },
    );
  }
  const report: UploadReport = {
    container: read.container,
    part: read.part,
    preview: read.preview,
    rows: read.rowCount,
    columns: read.columns,
    remembered: remembered && { id: remembered.id },
    notes: [
      ...(remembered ? [describeMapping(remembered.columnMap)] : []),
      ...read.notes,
      ...plan.notes,
    ],
    faults: [],
    faultCount: 0,
    items: [
      ...plan.items,
      ...(source.settings.leaveOut ?? []).map((name) => ({
        name,
        outcome: 'left-out' as const,
        summary: 'left out of this import',
      })),
    ],
    summary: plan.summary,
  };
  return { plan, report, settings: source.settings };
}
