import { Op } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { InputError, NotFound } from '@/lib/errors';
import {
  foldName,
  type KnownMap,
  type Note,
  type ReadContext,
  type ReadResult,
  type UploadKind,
} from '@/lib/formats';
import type { UploadReport, UploadSettings } from '@/lib/schemas/uploads';
import { BUILT_IN_LAW_BANDS, decodeMap } from '@/lib/sensitivity';
import { CoolingTableRow, type SurveyRow, TargetRow } from '@/models';
import { streamMaps } from '@/models/map-stream';
import { recallMapping } from './column-memory';
import { planCompanions } from './intake/companions';
import { planCompletenessMaps } from './intake/completeness-maps';
import { planContrastCurves } from './intake/contrast-curves';
import { planCoolingTable } from './intake/cooling-table';
import type { Plan } from './intake/plan';
import { planSystems } from './intake/systems';
import { takeBackWithdrawn } from './intake/take-back';
import { planTargets } from './intake/targets';
import { type KeptFile, readOnThread } from './reading';

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

/** Maps of the targets that a file names: a large survey's maps together would fill the memory. */
async function mapsByName(survey: SurveyRow, named: string[]): Promise<Map<string, KnownMap>> {
  const targets = await TargetRow.findAll({
    attributes: ['name', 'mapId'],
    where: { surveyId: survey.id, foldedName: named.map(foldName), mapId: { [Op.not]: null } },
  });
  const maps = new Map<string, KnownMap>();
  const keys = targets.map(({ mapId }) => mapId as string);
  await streamMaps(survey.collaborationId, { by: 'id', keys }, (map, place) => {
    maps.set(targets[place].name, {
      massMjup: [...map.massMjup],
      semiMajorAxisAu: [...map.semiMajorAxisAu],
      completeness: [...decodeMap(map.encoded)],
    });
  });
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
  return context;
}

/** Reads a file; one of companions twice, as its notes need the maps of the stars that it names. */
async function readSource(source: Source, file: KeptFile): Promise<ReadResult> {
  const context = await contextOf(source);
  const read = await readOnThread(file, context);
  if (!source.survey || !read.ok || read.kind !== 'companions') return read;
  const named = new Set(read.records.map(({ target }) => target));
  const maps = await mapsByName(source.survey, [...named]);
  return maps.size === 0 ? read : readOnThread(file, { ...context, maps });
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
async function readAsBefore(source: Source, file: KeptFile): Promise<Reading> {
  const read = await readSource(source, file);
  const isOwn = source.settings.columnMap !== undefined;
  const remembered = isOwn ? null : await recallMapping(source.survey, source.kind, read.columns);
  if (!remembered) return { read, source, remembered };
  const settings = { ...source.settings, columnMap: remembered.columnMap };
  const mapped = { ...source, settings };
  return { read: await readSource(mapped, file), source: mapped, remembered };
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
export async function dryRun(actor: Actor, given: Source, file: KeptFile): Promise<DryRun> {
  const { read, source, remembered } = await readAsBefore(given, file);
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
