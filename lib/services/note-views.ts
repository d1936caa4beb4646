import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import {
  type NoteItem,
  type NoteList,
  type NoteReply,
  type NoteView,
  noteListSchema,
} from '@/lib/schemas/notes';
import { database } from '@/models';
import { type FoundItem, findItem, noteColumns } from './note-items';

interface Fields {
  id: string;
  parentId: string | null;
  body: string;
  authorId: string | null;
  author: string | null;
  at: Date;
  editedAt: Date | null;
  removedAt: Date | null;
  resolvedAt: Date | null;
  resolvedBy: string | null;
  isNew: boolean;
  mentions: { id: string; name: string }[];
}

const SOMEBODY = 'somebody who left';

/** Notes on a thing; what is new is new since the visit before, or since the person joined. */
function readNotes(actor: Actor, item: FoundItem): Promise<Fields[]> {
  return database().query<Fields>(
    `select n.id, n.parent_id as "parentId", n.body, n.created_by as "authorId", p.name as author,
       n.created_at as at, n.edited_at as "editedAt",
       n.removed_at as "removedAt", n.resolved_at as "resolvedAt", r.name as "resolvedBy",
       n.removed_at is null and n.created_by is distinct from $2::uuid
         and n.created_at > coalesce(v.seen_at, m.created_at, 'infinity') as "isNew",
       coalesce((select jsonb_agg(jsonb_build_object('id', x.person_id, 'name', x.name)
         order by x.name) from note_mention x where x.note_id = n.id), '[]') as mentions
     from note n
       left join person p on p.id = n.created_by left join person r on r.id = n.resolved_by
       left join member m on m.collaboration_id = n.collaboration_id and m.person_id = $2
       left join note_visit v on v.collaboration_id = n.collaboration_id and v.person_id = $2
         and v.item_kind = $3 and v.item_id = $4
     where n.collaboration_id = $1 and n.${noteColumns[item.kind]} = $4
     order by n.created_at, n.id`,
    {
      bind: [actor.collaborationId, actor.personId, item.kind, item.id],
      type: QueryTypes.SELECT,
    },
  );
}

function describeNote(row: Fields, actor: Actor, canWrite: boolean): NoteReply {
  const isRemoved = row.removedAt !== null;
  return {
    id: row.id,
    body: isRemoved ? null : row.body,
    mentions: isRemoved ? [] : row.mentions,
    author: {
      id: row.authorId,
      name: row.author ?? SOMEBODY,
    },
    at: row.at.toISOString(),
    editedAt: row.editedAt?.toISOString() ?? null,
    isNew: row.isNew,
    can: { change: canWrite && !isRemoved && row.authorId === actor.personId },
  };
}

/** All notes on a thing: threads with their replies, the oldest first. */
export async function listNotes(actor: Actor, on: NoteItem): Promise<NoteList> {
  demand(actor, 'read');
  const item = await findItem(actor.collaborationId, on);
  const rows = await readNotes(actor, item);
  const canWrite = may(actor, 'write-note');
  const threads = rows
    .filter(({ parentId }) => parentId === null)
    .map((row): NoteView => {
      const replies = rows.filter(({ parentId }) => parentId === row.id);
      return {
        ...describeNote(row, actor, canWrite),
        resolved: row.resolvedAt && {
          at: row.resolvedAt.toISOString(),
          by: row.resolvedBy ?? SOMEBODY,
        },
        replies: replies.map((reply) => describeNote(reply, actor, canWrite)),
      };
    });
  return noteListSchema.parse({
    notes: threads,
    new: rows.filter(({ isNew }) => isNew).length,
    can: { write: canWrite },
  });
}

/** From now on what stands here is read: only later notes are new. */
export async function seeNotes(actor: Actor, on: NoteItem): Promise<void> {
  demand(actor, 'read');
  const item = await findItem(actor.collaborationId, on);
  await database().query(
    `insert into note_visit (collaboration_id, person_id, item_kind, item_id)
     values ($1, $2, $3, $4)
     on conflict (collaboration_id, person_id, item_kind, item_id)
       do update set seen_at = clock_timestamp()`,
    { bind: [actor.collaborationId, actor.personId, item.kind, item.id] },
  );
}
