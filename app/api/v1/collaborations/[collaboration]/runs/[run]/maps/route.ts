import { promisify } from 'node:util';
import { gzip } from 'node:zlib';
import { collaborationRoute } from '@/app/api/v1/handler';
import { getRunMaps } from '@/lib/services/runs';

/** The quickest level: maps are smooth, so it already takes three quarters of the bytes away. */
const LEVEL = 1;
const compress = promisify(gzip);

/** uint16 little-endian, [star, mass, semi-major axis]; a run's maps never change. */
export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params, request }) => {
  const { bytes, shape, digest } = await getRunMaps(actor, params.run);
  const headers: Record<string, string> = {
    ETag: `"${digest}"`,
    'Cache-Control': 'private, max-age=31536000, immutable',
    Vary: 'Accept-Encoding',
    'X-Rarebound-Shape': shape.join(','),
    'X-Rarebound-Scale': '65535',
  };
  if (request.headers.get('if-none-match') === `"${digest}"`) {
    return new Response(null, { status: 304, headers });
  }
  headers['Content-Type'] = 'application/octet-stream';
  if (!/\bgzip\b/.test(request.headers.get('accept-encoding') ?? '')) {
    return new Response(new Uint8Array(bytes), { headers });
  }
  headers['Content-Encoding'] = 'gzip';
  return new Response(new Uint8Array(await compress(bytes, { level: LEVEL })), { headers });
});
