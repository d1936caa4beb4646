import { openRoute } from '@/app/api/v1/handler';
import { requireSameOrigin } from '@/lib/access/requests';
import { writeGuestNoteSchema } from '@/lib/schemas/releases';
import { writeGuestNote } from '@/lib/services/releases/guest-links';

/** A note of whoever holds a guest link; the link is the only thing that lets them in. */
export const POST = openRoute(
  { body: writeGuestNoteSchema, status: 201 },
  ({ request, params, body }) => {
    requireSameOrigin(request);
    return writeGuestNote(params.token, body);
  },
);
