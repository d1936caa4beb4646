import { NotesBelow } from '@/components/notes/notes-below';
import type { Actor } from '@/lib/access/actor';
import type { NoteItem } from '@/lib/schemas/notes';
import { listNotes } from '@/lib/services/note-views';

/** The notes on a thing that the page has found already. */
export async function NotesOf({ actor, on }: { actor: Actor; on: NoteItem }) {
  return (
    <NotesBelow
      key={`${on.kind} ${on.key}`}
      collaboration={actor.collaboration}
      on={on}
      initial={await listNotes(actor, on)}
    />
  );
}
