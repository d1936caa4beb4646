import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import { enqueueExport } from '@/lib/queue/enqueue';
import { idSchema } from '@/lib/schemas/common';
import { type CollaborationExport, type LeavingView, leavingSchema } from '@/lib/schemas/leaving';
import {
  CollaborationExportRow,
  CollaborationRow,
  DepartureRow,
  database,
  inTransaction,
  JobRow,
  MemberRow,
  ReleaseRow,
} from '@/models';
import { recordAudit } from '../audit';

const MOST_LISTED = 5;

async function listExports(collaborationId: string): Promise<CollaborationExport[]> {
  const rows = await CollaborationExportRow.findAll({
    where: { collaborationId },
    order: [['createdAt', 'DESC']],
    limit: MOST_LISTED,
  });
  const jobs = await JobRow.findAll({ where: { id: rows.map(({ jobId }) => jobId) } });
  return rows.flatMap((row) => {
    const job = jobs.find(({ id }) => id === row.jobId);
    if (!job) return [];
    return {
      id: row.id,
      status: job.status,
      fault: job.fault,
      askedBy: row.askedByName,
      askedAt: row.createdAt.toISOString(),
      finishedAt: row.finishedAt?.toISOString() ?? null,
      expiresAt: row.expiresAt?.toISOString() ?? null,
      byteLength: row.byteLength === null ? null : Number(row.byteLength),
      sha256: row.sha256,
    };
  });
}

/** What an owner sees before taking the collaboration along, or ending it. */
export async function getLeaving(actor: Actor): Promise<LeavingView> {
  demand(actor, 'manage-collaboration');
  database();
  const { collaborationId } = actor;
  const where = { collaborationId };
  const [row, departure, exports, members, releases] = await Promise.all([
    CollaborationRow.findByPk(collaborationId, { rejectOnEmpty: true }),
    DepartureRow.findByPk(collaborationId),
    listExports(collaborationId),
    MemberRow.count({ where }),
    ReleaseRow.findAll({ attributes: ['publishedAt'], where }),
  ]);
  return leavingSchema.parse({
    name: row.name,
    exports,
    deletion: departure && {
      askedBy: departure.askedByName,
      askedAt: departure.askedAt.toISOString(),
      dueAt: departure.dueAt.toISOString(),
    },
    publishedReleases: releases.filter(({ publishedAt }) => publishedAt !== null).length,
    members,
  });
}

/**
 * Asks for the whole collaboration as one archive.
 *
 * @throws Conflict while one is being made
 */
export async function askForExport(actor: Actor): Promise<LeavingView> {
  demand(actor, 'manage-collaboration');
  const { collaborationId, personId: askedBy, personName: askedByName } = actor;
  await inTransaction(async (transaction) => {
    // One after the other: two requests at once would both find none under way.
    await CollaborationRow.findByPk(collaborationId, {
      transaction,
      lock: transaction.LOCK.NO_KEY_UPDATE,
    });
    const open = await JobRow.count({
      where: {
        collaborationId,
        kind: 'export-collaboration',
        status: ['waiting', 'running'],
      },
      transaction,
    });
    if (open > 0) throw new Conflict('An archive is being made: wait for it');
    const jobId = await enqueueExport(transaction, { collaborationId, requestedBy: askedBy });
    await CollaborationExportRow.create(
      { collaborationId, jobId, askedBy, askedByName },
      { transaction },
    );
    const item = { kind: 'collaboration', id: collaborationId };
    const summary = 'asked for the whole collaboration as an archive';
    await recordAudit(actor, 'export', item, summary, transaction);
  });
  return getLeaving(actor);
}

async function readPart(exportId: string, number: number): Promise<Buffer | null> {
  const [part] = await database().query<{ bytes: Buffer }>(
    'select bytes from collaboration_export_part where export_id = $1 and part_number = $2',
    { bind: [exportId, number], type: QueryTypes.SELECT },
  );
  return part?.bytes ?? null;
}

/** The archive as a stream, a part at a time. @throws NotFound before it is whole, and after its days */
export async function openExport(actor: Actor, id: string) {
  demand(actor, 'manage-collaboration');
  database();
  const { collaborationId } = actor;
  const row = idSchema.safeParse(id).success
    ? await CollaborationExportRow.findOne({ where: { id, collaborationId } })
    : null;
  if (!row?.expiresAt || !row.sha256 || row.expiresAt <= new Date()) throw new NotFound('archive');
  await inTransaction((transaction) =>
    recordAudit(
      actor,
      'export',
      { kind: 'collaboration', id: collaborationId },
      'fetched the whole collaboration as an archive',
      transaction,
      { sha256: row.sha256 },
    ),
  );
  let number = 0;
  const stream = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const part = await readPart(row.id, number++);
      if (part) controller.enqueue(new Uint8Array(part));
      else controller.close();
    },
  });
  const day = (row.finishedAt ?? row.createdAt).toISOString().slice(0, 10);
  const fileName = `${actor.collaboration}-${day}.zip`;
  return { stream, fileName, byteLength: Number(row.byteLength), sha256: row.sha256 };
}
