import { collaborationRoute } from '@/app/api/v1/handler';
import { getUploadBytes } from '@/lib/services/uploads';

/** The original bytes, always as an attachment. */
export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params }) => {
  const { bytes, fileName, sha256 } = await getUploadBytes(actor, params.upload);
  return new Response(bytes, {
    headers: {
      'Content-Type': 'application/octet-stream',
      'Content-Disposition': `attachment; filename*=UTF-8''${encodeURIComponent(fileName)}`,
      'Content-Security-Policy': 'sandbox',
      'X-Content-Type-Options': 'nosniff',
      'Repr-Digest': `sha-256=:${Buffer.from(sha256, 'hex').toString('base64')}:`,
    },
  });
});
