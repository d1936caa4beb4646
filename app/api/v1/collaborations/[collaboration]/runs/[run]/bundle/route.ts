import { collaborationRoute } from '@/app/api/v1/handler';
import { exportRunBundle } from '@/lib/services/releases/bundled-runs';

/** Everything that a finished run rests on, as one archive; it says how the run stands. */
export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params }) => {
  const { fileName, bytes } = await exportRunBundle(actor, params.run);
  return new Response(new Uint8Array(bytes), {
    headers: {
      'Content-Type': 'application/zip',
      'Content-Length': String(bytes.length),
      'Content-Disposition': `attachment; filename="${fileName}"`,
    },
  });
});
