import { QueryTypes, type Transaction } from 'sequelize';
import { NotFound } from '@/lib/errors';
import { idSchema } from '@/lib/schemas/common';
import type { NoteItem, NoteItemKind } from '@/lib/schemas/notes';
import { database } from '@/models';

/** A thing that notes hang on, with who is told of them. */
export interface FoundItem {
  kind: NoteItemKind;
  id: string;
  /** "A-31", "run 18 of A-31", "HALYARD". */
  label: string;
  /** Below the collaboration's address. */
  path: string;
  /** Who made it or leads it. */
  ownerId: string | null;
}

/** Column of the note that names a thing of each kind. */
export const noteColumns = {
  survey: 'survey_id',
  star: 'star_id',
  analysis: 'analysis_id',
  run: 'run_id',
  candidate: 'companion_id',
} as const satisfies Record<NoteItemKind, string>;

const statements: Record<NoteItemKind, string> = {
  survey: `select id, name as label, '/surveys/' || slug as path, lead_id as "ownerId"
    from survey where collaboration_id = $1 and slug = $2`,
  star: `select id, name as label, '/stars/' || id as path, null::uuid as "ownerId"
    from star where collaboration_id = $1 and id::text = $2`,
  analysis: `select id, 'A-' || number as label, '/analyses/A-' || number as path,
      created_by as "ownerId"
    from analysis where collaboration_id = $1 and 'A-' || number = $2`,
  run: `select r.id, 'run ' || r.number || ' of A-' || a.number as label,
      '/analyses/A-' || a.number as path, r.created_by as "ownerId"
    from run r join analysis a on a.id = r.analysis_id
    where r.collaboration_id = $1 and r.id::text = $2`,
  candidate: `select c.id, t.name || ' ' || c.name as label, '/candidates/' || c.id as path,
      s.lead_id as "ownerId"
    from companion c join target t on t.id = c.target_id join survey s on s.id = t.survey_id
    where c.collaboration_id = $1 and c.id::text = $2`,
};

const byId: readonly NoteItemKind[] = ['star', 'run', 'candidate'];

/** @throws NotFound for what is absent or of another collaboration: the two are not told apart */
export async function findItem(
  collaborationId: string,
  { kind, key }: NoteItem,
  transaction?: Transaction,
): Promise<FoundItem> {
  const isKey = !byId.includes(kind) || idSchema.safeParse(key).success;
  const [found] = isKey
    ? await database().query<Omit<FoundItem, 'kind'>>(statements[kind], {
        bind: [collaborationId, key.toString()],
        type: QueryTypes.SELECT,
        transaction,
      })
    : [];
  if (!found) throw new NotFound(kind);
  return { kind, ...found };
}
