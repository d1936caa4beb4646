import { readFile } from 'node:fs/promises';
import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { InputError } from '@/lib/errors';
import type { UploadKind } from '@/lib/formats';
import {
  type UnfinishedFileRequest,
  type UnfinishedFileView,
  type UploadQuery,
  type UploadReport,
  type UploadSettings,
  type UploadView,
  uploadSettingsSchema,
} from '@/lib/schemas/uploads';
import { database, inTransaction, type SurveyRow, UploadRow } from '@/models';
import { dryRun, type Source } from './dry-run';
import { type IncomingFile, receiveFile, storeParts } from './incoming-file';
import { refuseShared } from './sharing/shared-surveys';
import { findSurvey, isLead } from './surveys';
import { beginFile, takeFinished } from './unfinished-files';
import { describeUpload } from './uploads';

function parseSettings(text: string | undefined): UploadSettings {
  if (text === undefined) return {};
  let given: unknown;
  try {
    given = JSON.parse(text);
  } catch {
    throw new InputError(
      { code: 'json-invalid', item: 'query "settings"', expected: 'a JSON object' },
      { status: 400 },
    );
  }
  const parsed = uploadSettingsSchema.safeParse(given);
  if (parsed.success) return parsed.data;
  const issue = parsed.error.issues[0];
  throw new InputError(
    { code: 'schema', item: `query "settings", ${issue.path.join('.')}`, message: issue.message },
    { status: 400 },
  );
}

async function surveyFor(
  actor: Actor,
  kind: UploadKind,
  slug: string | undefined,
): Promise<SurveyRow | null> {
  if (kind === 'cooling-tables') {
    demand(actor, 'import-cooling-table');
    return null;
  }
  if (kind === 'systems') {
    demand(actor, 'save-population', { isOwn: true });
    return null;
  }
  if (slug === undefined) {
    throw new InputError(
      {
        code: 'value-missing',
        item: 'query "survey"',
        found: 'nothing',
        expected: 'the survey that the file belongs to',
      },
      { status: 400 },
    );
  }
  const survey = await findSurvey(actor, slug);
  demand(actor, 'import', { isLead: isLead(actor, survey) });
  await refuseShared(survey);
  return survey;
}

/** Receives a file, reads every line of it, and keeps it for a person to confirm. A refused file leaves no trace. */
export async function receiveUpload(
  actor: Actor,
  query: UploadQuery,
  request: Request,
): Promise<UploadView> {
  const survey = await surveyFor(actor, query.kind, query.survey);
  const source: Source = {
    kind: query.kind,
    fileName: query.name,
    survey,
    settings: parseSettings(query.settings),
  };
  const { unfinished } = query;
  const file =
    unfinished === undefined
      ? await receiveFile(request)
      : await takeFinished(actor, unfinished, request.headers);
  let isKept = false;
  try {
    const { report, settings } = await dryRun(actor, source, {
      byteLength: file.byteLength,
      load: () => readFile(file.path),
    });
    const row = await inTransaction((transaction) =>
      keepFile(actor, { ...source, settings }, file, report, transaction),
    );
    isKept = true;
    return await describeUpload(row);
  } finally {
    // A refused file that came in parts can be read again with other settings.
    if (isKept || unfinished === undefined) await file.discard();
  }
}

/** Begins a file that comes in parts, for a person who may import it. */
export async function beginUpload(
  actor: Actor,
  { kind, survey, byteLength }: UnfinishedFileRequest,
): Promise<UnfinishedFileView> {
  await surveyFor(actor, kind, survey);
  return beginFile(actor, byteLength);
}

/**
 * The upload of these bytes: the one that is there already, where the same file was sent for the
 * same survey and kind and waits to be stored, else a new one.
 */
async function keepFile(
  actor: Actor,
  { kind, survey, fileName, settings }: Source,
  { sha256, byteLength, ...file }: IncomingFile,
  report: UploadReport,
  transaction: Transaction,
): Promise<UploadRow> {
  const place = {
    collaborationId: actor.collaborationId,
    surveyId: survey?.id ?? null,
    kind,
    sha256,
    state: 'read',
  };
  const said = { fileName, settings, report: report as unknown as Record<string, unknown> };
  // One after the other: two that come at once would both find no upload.
  await database().query('select pg_advisory_xact_lock(hashtextextended($1, 0))', {
    bind: [`${place.collaborationId} ${place.surveyId} ${kind} ${sha256}`],
    transaction,
  });
  const there = await UploadRow.findOne({ where: place, transaction });
  if (there) return there.update(said, { transaction });
  const created = await UploadRow.create(
    { ...place, ...said, byteLength, uploadedBy: actor.personId },
    { transaction },
  );
  await storeParts(created.id, { sha256, byteLength, ...file }, transaction);
  return created;
}
