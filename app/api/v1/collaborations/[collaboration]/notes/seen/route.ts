import { collaborationRoute } from '@/app/api/v1/handler';
import { noteItemSchema } from '@/lib/schemas/notes';
import { seeNotes } from '@/lib/services/note-views';

/** Who reads may say so, whatever else they may do. */
export const POST = collaborationRoute(
  { scope: 'write', body: noteItemSchema },
  ({ actor, body }) => seeNotes(actor, body),
);
