import { collaborationRoute } from '@/app/api/v1/handler';
import { bytesIn, isPart, requireVersion, standing } from '@/app/api/v1/parts';
import { unfinishedQuerySchema } from '@/lib/schemas/uploads';
import { beginUpload } from '@/lib/services/receive-upload';
import { appendPart } from '@/lib/services/unfinished-files';

/** Begins a file that comes in parts; the body may be the first of them. */
export const POST = collaborationRoute(
  { scope: 'write', query: unfinishedQuerySchema, rawBody: true, limit: 'uploads', status: 201 },
  async ({ actor, query, request }) => {
    requireVersion(request);
    const byteLength = bytesIn(request, 'Upload-Length');
    const begun = await beginUpload(actor, { ...query, byteLength });
    const file = isPart(request) ? await appendPart(actor, begun.id, 0, request) : begun;
    const address = new URL(request.url);
    return Response.json(file, {
      status: 201,
      headers: { ...standing(file), Location: `${address.pathname}/${file.id}` },
    });
  },
);
