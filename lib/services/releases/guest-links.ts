import { createHash, randomBytes } from 'node:crypto';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import { idSchema } from '@/lib/schemas/common';
import type { GuestPage } from '@/lib/schemas/release-page';
import type {
  createGuestLinkSchema,
  GuestLinkView,
  writeGuestNoteSchema,
} from '@/lib/schemas/releases';
import {
  AnalysisRow,
  database,
  FrozenRunRow,
  GuestLinkRow,
  GuestNoteRow,
  inTransaction,
  PersonRow,
  ReleaseRow,
  RunRow,
} from '@/models';
import { recordAudit } from '../audit';
import { addressOfRelease } from './address';
import { findRelease } from './describe';
import { showFrozenRun, showRelease } from './public-page';

const DAY_MS = 86_400_000;
/** 240 random bits need no slow hash. */
const TOKEN_BYTES = 30;
const SHAPE = /^guest-[A-Za-z0-9_-]{40}$/;
/** Notes that one link may leave. */
const MOST_NOTES = 200;

const hashOf = (token: string) => createHash('sha256').update(token).digest('hex');
export const isGuestToken = (code: string) => SHAPE.test(code);

const isOpen = (row: GuestLinkRow) =>
  row.revokedAt === null && row.expiresAt.getTime() > Date.now();

async function nameOfRun(runId: string): Promise<string> {
  const run = await RunRow.findByPk(runId, { rejectOnEmpty: true });
  const analysis = await AnalysisRow.findByPk(run.analysisId, { rejectOnEmpty: true });
  return `A-${analysis.number}, run ${run.number}`;
}

async function viewsOf(rows: GuestLinkRow[]): Promise<GuestLinkView[]> {
  const notes = await GuestNoteRow.findAll({
    where: { linkId: rows.map(({ id }) => id) },
    order: [['createdAt', 'ASC']],
  });
  const people = await PersonRow.findAll({
    where: { id: rows.flatMap(({ createdBy }) => createdBy ?? []) },
  });
  const views: GuestLinkView[] = [];
  for (const row of rows) {
    const release = row.releaseId ? await ReleaseRow.findByPk(row.releaseId) : null;
    views.push({
      id: row.id,
      label: row.label,
      opens: release ? `R-${release.number}` : await nameOfRun(row.runId as string),
      ending: row.tokenEnding,
      expiresAt: row.expiresAt.toISOString(),
      revokedAt: row.revokedAt?.toISOString() ?? null,
      lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
      isOpen: isOpen(row),
      createdBy: people.find(({ id }) => id === row.createdBy)?.name ?? null,
      createdAt: row.createdAt.toISOString(),
      notes: notes
        .filter(({ linkId }) => linkId === row.id)
        .map(({ id, name, body, createdAt }) => ({
          id,
          name,
          body,
          createdAt: createdAt.toISOString(),
        })),
    });
  }
  return views;
}

/** Links of the collaboration, the newest first, with the notes that guests left. */
export async function listGuestLinks(actor: Actor): Promise<{ links: GuestLinkView[] }> {
  demand(actor, 'read');
  database();
  const rows = await GuestLinkRow.findAll({
    where: { collaborationId: actor.collaborationId },
    order: [['createdAt', 'DESC']],
  });
  return { links: await viewsOf(rows) };
}

async function findOpened(actor: Actor, input: z.output<typeof createGuestLinkSchema>) {
  const { collaborationId } = actor;
  if (input.releaseId) {
    const release = await findRelease(actor, input.releaseId);
    if (release.withdrawnAt) throw new Conflict(`R-${release.number} was withdrawn`);
    return { releaseId: release.id, runId: null, opens: `R-${release.number}` };
  }
  const { runId } = input;
  const frozen = runId && (await FrozenRunRow.count({ where: { runId, collaborationId } }));
  if (!runId || !frozen) throw new NotFound('frozen run');
  return { releaseId: null, runId, opens: await nameOfRun(runId) };
}

/** A private address for somebody without an account. The address is told once and kept as a hash. */
export async function createGuestLink(
  actor: Actor,
  input: z.output<typeof createGuestLinkSchema>,
): Promise<{ link: GuestLinkView; address: string }> {
  demand(actor, 'link-guest');
  database();
  const { opens, ...target } = await findOpened(actor, input);
  const token = `guest-${randomBytes(TOKEN_BYTES).toString('base64url')}`;
  const row = await inTransaction(async (transaction) => {
    const created = await GuestLinkRow.create(
      {
        ...target,
        collaborationId: actor.collaborationId,
        label: input.label,
        tokenHash: hashOf(token),
        tokenEnding: token.slice(-4),
        expiresAt: new Date(Date.now() + input.days * DAY_MS),
        createdBy: actor.personId,
      },
      { transaction },
    );
    const item = { kind: 'guest-link', id: created.id };
    await recordAudit(actor, 'link-guest', item, `gave a guest a link to ${opens}`, transaction);
    return created;
  });
  const [link] = await viewsOf([row]);
  return { link, address: addressOfRelease(token) };
}

/** Ends a link; whoever holds it finds nothing from now on. */
export async function revokeGuestLink(actor: Actor, id: string): Promise<void> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const row = idSchema.safeParse(id).success
    ? await GuestLinkRow.findOne({ where: { id, collaborationId } })
    : null;
  if (!row) throw new NotFound('guest link');
  demand(actor, 'link-guest');
  await inTransaction(async (transaction) => {
    if (row.revokedAt) return;
    await row.update({ revokedAt: new Date() }, { transaction });
    const item = { kind: 'guest-link', id: row.id };
    await recordAudit(
      actor,
      'link-guest',
      item,
      `ended the guest link "${row.label}"`,
      transaction,
    );
  });
}

/** The link of a token. @throws NotFound once it is revoked or past its end */
async function openLink(token: string): Promise<GuestLinkRow> {
  database();
  const row = isGuestToken(token)
    ? await GuestLinkRow.findOne({ where: { tokenHash: hashOf(token) } })
    : null;
  if (!row || !isOpen(row)) throw new NotFound('page');
  return row;
}

/** What the link opens and nothing else; notes its use. */
export async function readAsGuest(token: string): Promise<GuestPage> {
  const link = await openLink(token);
  await link.update({ lastUsedAt: new Date() });
  const release = link.releaseId ? await ReleaseRow.findByPk(link.releaseId) : null;
  const page = release
    ? await showRelease(release)
    : await showFrozenRun(link.collaborationId, link.runId as string);
  const notes = await GuestNoteRow.findAll({
    where: { linkId: link.id },
    order: [['createdAt', 'ASC']],
  });
  return {
    ...page,
    guest: {
      label: link.label,
      expiresAt: link.expiresAt.toISOString(),
      notes: notes.map(({ id, name, body, createdAt }) => ({
        id,
        name,
        body,
        at: createdAt.toISOString(),
      })),
    },
  };
}

/** A note of whoever holds the link, signed with the name that they give. */
export async function writeGuestNote(
  token: string,
  { name, body }: z.output<typeof writeGuestNoteSchema>,
): Promise<{ id: string; name: string; body: string; createdAt: string }> {
  const link = await openLink(token);
  const { collaborationId } = link;
  if ((await GuestNoteRow.count({ where: { linkId: link.id } })) >= MOST_NOTES) {
    throw new Conflict(`This link has ${MOST_NOTES} notes, the most that one takes`);
  }
  const row = await GuestNoteRow.create({ collaborationId, linkId: link.id, name, body });
  return { id: row.id, name, body, createdAt: row.createdAt.toISOString() };
}
