import type { RunMaps } from '@/lib/services/runs';

/** uint16 little-endian, [star, mass, semi-major axis]: stored maps, which never change. */
export function answerMaps({ bytes, shape, digest }: RunMaps, request: Request): Response {
  const headers = {
    ETag: `"${digest}"`,
    'Cache-Control': 'private, max-age=31536000, immutable',
    'X-Rarebound-Shape': shape.join(','),
    'X-Rarebound-Scale': '65535',
  };
  if (request.headers.get('if-none-match') === `"${digest}"`) {
    return new Response(null, { status: 304, headers });
  }
  return new Response(new Uint8Array(bytes), {
    headers: { ...headers, 'Content-Type': 'application/octet-stream' },
  });
}
