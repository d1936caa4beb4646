import { collaborationRoute } from '@/app/api/v1/handler';
import { changeNoteSchema } from '@/lib/schemas/notes';
import { changeNote, getNote, removeNote } from '@/lib/services/notes';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getNote(actor, params.note),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: changeNoteSchema,
    limit: 'notes',
    current: ({ actor, params }) => getNote(actor, params.note),
  },
  ({ actor, params, body }) => changeNote(actor, params.note, body),
);

export const DELETE = collaborationRoute(
  { scope: 'write', current: ({ actor, params }) => getNote(actor, params.note) },
  ({ actor, params }) => removeNote(actor, params.note),
);
