import { collaborationRoute } from '@/app/api/v1/handler';
import { openExport } from '@/lib/services/leaving/exports';

/** The archive, streamed, as an attachment. */
export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params }) => {
  const { stream, fileName, byteLength, sha256 } = await openExport(actor, params.export);
  return new Response(stream, {
    headers: {
      'Content-Type': 'application/zip',
      'Content-Length': String(byteLength),
      'Content-Disposition': `attachment; filename="${fileName}"`,
      'Repr-Digest': `sha-256=:${Buffer.from(sha256, 'hex').toString('base64')}:`,
    },
  });
});
