import { QueryTypes, type Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { AccessError, Conflict, InputError, NotFound } from '@/lib/errors';
import { withdrawMessages } from '@/lib/mail/outbox';
import { idSchema } from '@/lib/schemas/common';
import {
  type ChangeNote,
  type NoteItem,
  type NoteItemKind,
  type NoteList,
  type OneNote,
  oneNoteSchema,
  type WriteNote,
} from '@/lib/schemas/notes';
import { database, inTransaction, NoteRow } from '@/models';
import { recordAudit } from './audit';
import { type FoundItem, findItem } from './note-items';
import { tellMentioned, tellOfNote } from './note-mail';
import { listNotes } from './note-views';

const modelFields = {
  survey: 'surveyId',
  star: 'starId',
  analysis: 'analysisId',
  run: 'runId',
  candidate: 'companionId',
} as const satisfies Record<NoteItemKind, keyof NoteRow>;

/**
 * The members named in a text, by the name that stands in it.
 *
 * @throws InputError for somebody who is no member, and for a name that the text does not hold
 */
async function checkMentions(
  actor: Actor,
  body: string,
  ids: readonly string[],
  transaction: Transaction,
): Promise<{ id: string; name: string }[]> {
  const wanted = [...new Set(ids)];
  if (wanted.length === 0) return [];
  const people = await database().query<{ id: string; name: string }>(
    `select p.id, p.name from member m join person p on p.id = m.person_id
     where m.collaboration_id = $1 and m.suspended_at is null and p.id = any($2::uuid[])`,
    { bind: [actor.collaborationId, wanted], type: QueryTypes.SELECT, transaction },
  );
  if (people.length < wanted.length) {
    throw new InputError({
      code: 'not-a-member',
      item: 'mentions',
      message: 'a note can name members of this collaboration only',
    });
  }
  const absent = people.find(({ name }) => !body.includes(`@${name}`));
  if (absent) {
    throw new InputError({
      code: 'not-in-the-text',
      item: 'mentions',
      found: absent.name,
      expected: `"@${absent.name}" in the text`,
    });
  }
  return people;
}

async function mentionedIn(note: NoteRow, transaction: Transaction): Promise<Set<string>> {
  const rows = await database().query<{ id: string }>(
    'select person_id as id from note_mention where note_id = $1',
    { bind: [note.id], type: QueryTypes.SELECT, transaction },
  );
  return new Set(rows.map(({ id }) => id));
}

async function storeMentions(
  note: NoteRow,
  people: readonly { id: string; name: string }[],
  transaction: Transaction,
): Promise<void> {
  await database().query('delete from note_mention where note_id = $1', {
    bind: [note.id],
    transaction,
  });
  for (const { id, name } of people) {
    await database().query(
      `insert into note_mention (note_id, collaboration_id, person_id, name)
       values ($1, $2, $3, $4)`,
      { bind: [note.id, note.collaborationId, id, name], transaction },
    );
  }
}

/** The note that begins the thread of another one, on the same thing; locked. */
async function findThread(
  collaborationId: string,
  item: FoundItem,
  id: string,
  transaction: Transaction,
): Promise<string> {
  const row = await NoteRow.findOne({
    where: { id, collaborationId, [modelFields[item.kind]]: item.id },
    lock: transaction.LOCK.KEY_SHARE,
    transaction,
  });
  if (!row) throw new NotFound('note');
  return row.parentId ?? row.id;
}

/** A note on a thing, or a reply; whom it concerns gets mail. */
export async function writeNote(actor: Actor, input: WriteNote): Promise<NoteList> {
  demand(actor, 'write-note');
  const { collaborationId, personId } = actor;
  await inTransaction(async (transaction) => {
    const item = await findItem(collaborationId, input.on, transaction);
    const parentId =
      input.replyTo === undefined
        ? null
        : await findThread(collaborationId, item, input.replyTo, transaction);
    const people = await checkMentions(actor, input.body, input.mentions, transaction);
    const note = await NoteRow.create(
      {
        collaborationId,
        [modelFields[item.kind]]: item.id,
        parentId,
        body: input.body,
        createdBy: personId,
      },
      { transaction },
    );
    await storeMentions(note, people, transaction);
    await tellOfNote(
      {
        id: note.id,
        threadId: parentId,
        collaborationId,
        authorId: personId,
        authorName: actor.personName,
        mentionIds: people.map(({ id }) => id),
      },
      item,
      transaction,
    );
    const words = parentId === null ? 'wrote a note on' : 'answered a note on';
    await audit(actor, 'write-note', words, note, item, transaction);
  });
  return listNotes(actor, input.on);
}

async function audit(
  actor: Parameters<typeof recordAudit>[0],
  action: string,
  words: string,
  note: NoteRow,
  item: FoundItem,
  transaction: Transaction,
): Promise<void> {
  const { kind, id, label } = item;
  const details = { noteId: note.id };
  await recordAudit(actor, action, { kind, id }, `${words} ${label}`, transaction, details);
}

/** One note, without the answers to it. */
export async function getNote(actor: Actor, id: string): Promise<OneNote> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const on = await inTransaction(async (transaction) => {
    const isId = idSchema.safeParse(id).success;
    const row = isId && (await NoteRow.findOne({ where: { id, collaborationId }, transaction }));
    if (!row) throw new NotFound('note');
    return keyOf(row, transaction);
  });
  const { notes } = await listNotes(actor, on);
  const found = notes.flatMap((note) => [note, ...note.replies]).find((note) => note.id === id);
  if (!found) throw new NotFound('note');
  return oneNoteSchema.parse(found);
}

async function lockNote(
  actor: Actor,
  id: string,
  transaction: Transaction,
): Promise<{ note: NoteRow; on: NoteItem; item: FoundItem }> {
  const note = idSchema.safeParse(id).success
    ? await NoteRow.findOne({
        where: { id, collaborationId: actor.collaborationId },
        lock: transaction.LOCK.UPDATE,
        transaction,
      })
    : null;
  if (!note) throw new NotFound('note');
  const on = await keyOf(note, transaction);
  return { note, on, item: await findItem(actor.collaborationId, on, transaction) };
}

/** The thing that a note hangs on, by the key that addresses use. */
async function keyOf(note: NoteRow, transaction: Transaction): Promise<NoteItem> {
  const { surveyId, analysisId } = note;
  if (surveyId === null && analysisId === null) {
    const kind = note.starId ? 'star' : note.runId ? 'run' : 'candidate';
    return { kind, key: String(note.starId ?? note.runId ?? note.companionId) };
  }
  const [{ key }] = await database().query<{ key: string }>(
    `select slug as key from survey where id = $1::uuid
     union all select 'A-' || number from analysis where id = $2::uuid`,
    { bind: [surveyId ?? null, analysisId ?? null], type: QueryTypes.SELECT, transaction },
  );
  return { kind: surveyId ? 'survey' : 'analysis', key };
}

function demandOwn(actor: Actor, note: NoteRow): void {
  if (note.createdBy !== actor.personId) {
    throw new AccessError('Only the person who wrote a note can change it. Answer it instead.');
  }
  if (note.removedAt !== null) throw new Conflict('This note was removed already', 'note-removed');
}

async function settle(
  actor: Actor,
  note: NoteRow,
  item: FoundItem,
  isResolved: boolean,
  transaction: Transaction,
): Promise<void> {
  if (note.parentId !== null) {
    throw new Conflict('A thread is settled at the note that began it', 'not-a-thread');
  }
  if ((note.resolvedAt !== null) === isResolved) return;
  note.resolvedAt = isResolved ? new Date() : null;
  note.resolvedBy = isResolved ? actor.personId : null;
  await note.save({ transaction });
  const words = isResolved ? 'settled a note on' : 'opened again a note on';
  await audit(actor, 'settle-note', words, note, item, transaction);
}

/** New words for one's own note, or whether its thread is settled, which everybody may say. */
export async function changeNote(actor: Actor, id: string, input: ChangeNote): Promise<NoteList> {
  demand(actor, 'write-note');
  const { body, isResolved } = input;
  const on = await inTransaction(async (transaction) => {
    const { note, on, item } = await lockNote(actor, id, transaction);
    if (isResolved !== undefined) {
      await settle(actor, note, item, isResolved, transaction);
      return on;
    }
    demandOwn(actor, note);
    if (body === undefined || body === note.body) return on;
    const people = await checkMentions(actor, body, input.mentions, transaction);
    const before = await mentionedIn(note, transaction);
    await note.update({ body, editedAt: new Date() }, { transaction });
    await storeMentions(note, people, transaction);
    const mentionIds = people.map((one) => one.id).filter((one) => !before.has(one));
    const { collaborationId, personId: authorId, personName: authorName } = actor;
    const written = { id, collaborationId, authorId, authorName, mentionIds };
    await tellMentioned(written, item, transaction);
    await audit(actor, 'change-note', 'changed a note on', note, item, transaction);
    return on;
  });
  return listNotes(actor, on);
}

/** Takes one's own note back: its words go, the mark that there was one stays. */
export async function removeNote(actor: Actor, id: string): Promise<NoteList> {
  demand(actor, 'write-note');
  const on = await inTransaction(async (transaction) => {
    const { note, on, item } = await lockNote(actor, id, transaction);
    demandOwn(actor, note);
    await note.update({ body: '', removedAt: new Date() }, { transaction });
    await storeMentions(note, [], transaction);
    await withdrawMessages(transaction, `note:${id}`);
    await audit(actor, 'remove-note', 'removed a note on', note, item, transaction);
    return on;
  });
  return listNotes(actor, on);
}
