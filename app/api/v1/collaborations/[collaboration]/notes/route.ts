import { collaborationRoute } from '@/app/api/v1/handler';
import { noteItemSchema, writeNoteSchema } from '@/lib/schemas/notes';
import { listNotes } from '@/lib/services/note-views';
import { writeNote } from '@/lib/services/notes';

export const GET = collaborationRoute(
  { scope: 'read', query: noteItemSchema },
  ({ actor, query }) => listNotes(actor, query),
);

export const POST = collaborationRoute(
  { scope: 'write', body: writeNoteSchema, status: 201, limit: 'notes' },
  ({ actor, body }) => writeNote(actor, body),
);
