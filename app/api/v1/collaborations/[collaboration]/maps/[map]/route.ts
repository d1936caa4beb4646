import { collaborationRoute } from '@/app/api/v1/handler';
import { getMap, getMapBytes } from '@/lib/services/maps';

/** JSON by default; `Accept: application/octet-stream` gives the stored uint16 values themselves. */
export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params, request }) => {
  if (!request.headers.get('accept')?.includes('application/octet-stream')) {
    return getMap(actor, params.map);
  }
  const { bytes, digest, shape } = await getMapBytes(actor, params.map);
  return new Response(new Uint8Array(bytes), {
    headers: {
      'Content-Type': 'application/octet-stream',
      'X-Rarebound-Shape': shape.join(','),
      'X-Rarebound-Scale': '65535',
      'Cache-Control': 'private, max-age=31536000, immutable',
      ETag: `"${digest}"`,
    },
  });
});
