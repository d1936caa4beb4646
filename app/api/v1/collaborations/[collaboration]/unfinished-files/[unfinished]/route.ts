import { collaborationRoute } from '@/app/api/v1/handler';
import { bytesIn, requirePart, requireVersion, standing } from '@/app/api/v1/parts';
import { appendPart, getUnfinished, removeUnfinished } from '@/lib/services/unfinished-files';

/** How much has come: the next part begins there. Asked by HEAD, as the protocol says, or by GET. */
export const GET = collaborationRoute({ scope: 'write' }, async ({ actor, params }) => {
  const file = await getUnfinished(actor, params.unfinished);
  return new Response(null, { status: 204, headers: standing(file) });
});

export const PATCH = collaborationRoute(
  { scope: 'write', rawBody: true },
  async ({ actor, params, request }) => {
    requireVersion(request);
    requirePart(request);
    const offset = bytesIn(request, 'Upload-Offset');
    const file = await appendPart(actor, params.unfinished, offset, request);
    return new Response(null, { status: 204, headers: standing(file) });
  },
);

export const DELETE = collaborationRoute({ scope: 'write' }, async ({ actor, params }) => {
  await removeUnfinished(actor, params.unfinished);
});
