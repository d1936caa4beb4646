import { Op, QueryTypes, UniqueConstraintError } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import type { UploadKind } from '@/lib/formats';
import { enqueueMaps, holdMaps } from '@/lib/queue/enqueue';
import { idSchema } from '@/lib/schemas/common';
import type { UploadReport, UploadSettings, UploadView } from '@/lib/schemas/uploads';
import { database, inTransaction, SurveyRow, UploadRow } from '@/models';
import { recordAudit } from './audit';
import { behindRow, type PageAsked } from './behind-row';
import { keepMapping } from './column-memory';
import { dryRun, type Source } from './dry-run';
import { loadParts } from './incoming-file';
import { noteChanges, takeStanding } from './intake/changes';
import type { KeptFile } from './reading';
import { findSurvey, isLead } from './surveys';
import { together } from './together';

interface Beside {
  id: string;
  survey: string | null;
  uploadedBy: string | null;
  withdrawnBy: string | null;
  /** The how-manieth file of its kind that the survey stored; null for one that is not stored. */
  version: number | null;
}

/** What stands in other tables, for all of them at once. */
function readBeside(ids: string[]): Promise<Beside[]> {
  return database().query<Beside>(
    `select u.id, s.slug as survey, p.name as "uploadedBy", w.name as "withdrawnBy",
       case when u.stored_at is not null and u.survey_id is not null then
         (select count(*)::int from upload o
          where o.survey_id = u.survey_id and o.kind = u.kind and o.stored_at <= u.stored_at)
       end as version
     from upload u left join survey s on s.id = u.survey_id
       left join person p on p.id = u.uploaded_by left join person w on w.id = u.withdrawn_by
     where u.id = any($1::uuid[])`,
    { bind: [ids], type: QueryTypes.SELECT },
  );
}

async function describeUploads(rows: UploadRow[]): Promise<UploadView[]> {
  const beside = new Map((await readBeside(rows.map(({ id }) => id))).map((one) => [one.id, one]));
  return rows.map((row) => {
    const { survey, uploadedBy, withdrawnBy, version } = beside.get(row.id) ?? {};
    return {
      id: row.id,
      kind: row.kind as UploadView['kind'],
      survey: survey ?? null,
      fileName: row.fileName,
      byteLength: Number(row.byteLength),
      sha256: row.sha256,
      state: row.state as UploadView['state'],
      settings: row.settings as UploadSettings,
      report: row.report as unknown as UploadReport,
      uploadedBy: uploadedBy ?? null,
      createdAt: row.createdAt.toISOString(),
      storedAt: row.storedAt?.toISOString() ?? null,
      version: version ?? null,
      withdrawnBy: withdrawnBy ?? null,
      withdrawnAt: row.withdrawnAt?.toISOString() ?? null,
    };
  });
}

export async function describeUpload(row: UploadRow): Promise<UploadView> {
  const [view] = await describeUploads([row]);
  return view;
}

/** Looked at before storing and not after. */
function withoutPreview(upload: UploadView): UploadView {
  const { preview: _, ...report } = upload.report;
  return { ...upload, report };
}

const keptFile = (row: UploadRow): KeptFile => ({
  byteLength: Number(row.byteLength),
  load: () => loadParts(row),
});

export async function findUpload(
  actor: Actor,
  id: string,
): Promise<{ row: UploadRow; survey: SurveyRow | null }> {
  demand(actor, 'read');
  const isId = idSchema.safeParse(id).success;
  const row = isId
    ? await UploadRow.findOne({ where: { id, collaborationId: actor.collaborationId } })
    : null;
  if (!row) throw new NotFound('upload');
  return { row, survey: row.surveyId ? await SurveyRow.findByPk(row.surveyId) : null };
}

export async function getUpload(actor: Actor, id: string): Promise<UploadView> {
  return describeUpload((await findUpload(actor, id)).row);
}

const NEWEST = {
  table: 'upload',
  keys: (row: string) => [`${row}.created_at`, `${row}.id`],
  direction: 'down',
} as const;

/** Uploads of the collaboration, or of one survey, newest first. */
export async function listUploads(
  actor: Actor,
  slug: string | undefined,
  page: PageAsked,
): Promise<UploadView[]> {
  demand(actor, 'read');
  const key = `uploads ${actor.collaborationId} ${JSON.stringify([slug, page])}`;
  return together(key, () => readUploads(actor, slug, page));
}

/** The same for every member. */
async function readUploads(
  actor: Actor,
  slug: string | undefined,
  { limit, offset, after }: PageAsked,
): Promise<UploadView[]> {
  const { collaborationId } = actor;
  const survey = slug === undefined ? null : await findSurvey(actor, slug);
  const rows = await UploadRow.findAll({
    where: {
      collaborationId,
      ...(survey && { surveyId: survey.id }),
      ...(after && {
        [Op.and]: await behindRow(NEWEST, { name: 'upload', collaborationId, after }),
      }),
    },
    order: [
      ['createdAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit,
    offset,
  });
  return (await describeUploads(rows)).map(withoutPreview);
}

/** The original bytes, as they came. */
export async function getUploadBytes(actor: Actor, id: string) {
  const { row } = await findUpload(actor, id);
  return { bytes: await loadParts(row), fileName: row.fileName, sha256: row.sha256 };
}

export function demandImport(actor: Actor, { kind }: UploadRow, survey: SurveyRow | null): void {
  if (survey) demand(actor, 'import', { isLead: isLead(actor, survey) });
  else if (kind === 'systems') demand(actor, 'save-population', { isOwn: true });
  else demand(actor, 'import-cooling-table');
}

/** Reads the kept file again with other settings. */
export async function changeUpload(
  actor: Actor,
  id: string,
  settings: UploadSettings,
): Promise<UploadView> {
  const { row, survey } = await findUpload(actor, id);
  demandImport(actor, row, survey);
  if (row.state !== 'read')
    throw new Conflict('This file is stored already; upload it again to change how it is read');
  const source: Source = { kind: row.kind as UploadKind, fileName: row.fileName, survey, settings };
  const read = await dryRun(actor, source, keptFile(row));
  const { report } = read;
  const [changed] = await UploadRow.update(
    { settings: read.settings, report: report as unknown as Record<string, unknown> },
    { where: { id: row.id, state: 'read' } },
  );
  if (changed === 0) throw new Conflict('This file was stored or withdrawn meanwhile');
  return describeUpload(await row.reload());
}

/** Stores all that the file says in one transaction, and starts the maps that follow from it. */
export async function storeUpload(actor: Actor, id: string): Promise<UploadView> {
  const { row, survey } = await findUpload(actor, id);
  demandImport(actor, row, survey);
  if (row.state === 'stored') return describeUpload(row);
  if (row.state === 'withdrawn')
    throw new Conflict('This file was withdrawn; upload it again to bring it back');
  const source: Source = {
    kind: row.kind as UploadKind,
    fileName: row.fileName,
    survey,
    settings: row.settings as UploadSettings,
  };
  const { plan, report } = await dryRun(actor, source, keptFile(row));
  try {
    await inTransaction(async (transaction) => {
      const [claimed] = await UploadRow.update(
        {
          state: 'stored',
          storedAt: new Date(),
          report: { ...report, preview: undefined } as unknown as Record<string, unknown>,
        },
        { where: { id: row.id, state: 'read' }, transaction },
      );
      if (claimed === 0) return;
      if (survey) await holdMaps(transaction, survey.id);
      const standing = survey && (await takeStanding(survey, transaction));
      await plan.apply(transaction, row.id);
      if (survey && standing) {
        await noteChanges(survey, row, standing, transaction);
        const file = {
          kind: row.kind,
          columns: report.columns,
          columnMap: source.settings.columnMap,
        };
        await keepMapping(actor, survey, file, transaction);
      }
      if (plan.needsMaps && survey) {
        await enqueueMaps(transaction, {
          collaborationId: actor.collaborationId,
          surveyId: survey.id,
          requestedBy: actor.personId,
        });
      }
      await recordAudit(
        actor,
        'import',
        { kind: 'upload', id: row.id },
        `stored ${row.fileName}: ${report.summary}`,
        transaction,
      );
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw new Conflict('Somebody stored the same rows meanwhile; read the file again');
    }
    throw error;
  }
  await row.reload();
  return describeUpload(row);
}
