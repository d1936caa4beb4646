import { collaborationRoute } from '@/app/api/v1/handler';
import { changeNoteSchema } from '@/lib/schemas/notes';
import { changeNote, removeNote } from '@/lib/services/notes';

export const PATCH = collaborationRoute(
  { scope: 'write', body: changeNoteSchema, limit: 'notes' },
  ({ actor, params, body }) => changeNote(actor, params.note, body),
);

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  removeNote(actor, params.note),
);
