import { QueryTypes, type Transaction } from 'sequelize';
import { queueMessage } from '@/lib/mail/outbox';
import { database } from '@/models';
import type { FoundItem } from './note-items';

interface WrittenNote {
  id: string;
  /** The note that began the thread; null for one that begins its own. */
  threadId: string | null;
  collaborationId: string;
  authorId: string;
  authorName: string;
  mentionIds: readonly string[];
}

async function placeOf(collaborationId: string, transaction: Transaction) {
  const [place] = await database().query<{ name: string; slug: string }>(
    'select name, slug from collaboration where id = $1',
    { bind: [collaborationId], type: QueryTypes.SELECT, transaction },
  );
  return place;
}

/** Tells people at once that a note names them. */
export async function tellMentioned(
  note: Pick<WrittenNote, 'id' | 'collaborationId' | 'authorId' | 'authorName' | 'mentionIds'>,
  item: FoundItem,
  transaction: Transaction,
): Promise<void> {
  const { collaborationId, authorName: who } = note;
  const { name: collaboration, slug } = await placeOf(collaborationId, transaction);
  const about = `note:${note.id}`;
  const path = `/${slug}${item.path}#note-${note.id}`;
  const data = { collaboration, who, item: item.label, path };
  for (const personId of note.mentionIds) {
    if (personId === note.authorId) continue;
    await queueMessage(transaction, 'mention', { personId }, data, { collaborationId, about });
  }
}

/**
 * Tells those whom a new note concerns, in the transaction that stores it: who is named in it at
 * once; who made or leads the thing, or wrote in the same thread, once an hour.
 */
export async function tellOfNote(
  note: WrittenNote,
  item: FoundItem,
  transaction: Transaction,
): Promise<void> {
  const { collaborationId, authorId, authorName: who, mentionIds } = note;
  await tellMentioned(note, item, transaction);
  const { name: collaboration, slug } = await placeOf(collaborationId, transaction);
  const concerned = await database().query<{ id: string }>(
    `select distinct m.person_id as id from member m
     where m.collaboration_id = $1 and (m.person_id = $2::uuid or m.person_id in (
       select created_by from note where id = $3::uuid or parent_id = $3::uuid))
     order by 1`,
    { bind: [collaborationId, item.ownerId, note.threadId], type: QueryTypes.SELECT, transaction },
  );
  for (const { id: personId } of concerned) {
    if (personId === authorId || mentionIds.includes(personId)) continue;
    const notes = [{ who, item: item.label }];
    const data = { collaboration, path: `/${slug}/activity?for=me`, notes };
    await queueMessage(transaction, 'notes', { personId }, data, { collaborationId });
  }
}
