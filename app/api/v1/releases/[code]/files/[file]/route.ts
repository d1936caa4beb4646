import { openRoute } from '@/app/api/v1/handler';
import { readReleaseFile } from '@/lib/services/releases/sign';

/** A file of a published release: the same bytes as long as it stands. */
export const GET = openRoute({}, async ({ params }) => {
  const file = await readReleaseFile(params.code, params.file);
  return new Response(new Uint8Array(file.bytes), {
    headers: {
      'Content-Type': file.mediaType,
      'Content-Length': String(file.byteLength),
      'Content-Disposition': `attachment; filename="${file.name}"`,
      'Repr-Digest': `sha-256=:${Buffer.from(file.sha256, 'hex').toString('base64')}:`,
      ETag: `"${file.sha256}"`,
    },
  });
});
