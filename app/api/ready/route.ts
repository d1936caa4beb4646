import { problemOf } from '@/app/api/v1/problem';
import { readReadiness } from '@/lib/services/health';

export const dynamic = 'force-dynamic';

/** For a load balancer: 200 when this server can do its work, 503 with the reason when not. */
export async function GET(): Promise<Response> {
  const headers = { 'Cache-Control': 'no-store', 'X-Content-Type-Options': 'nosniff' };
  try {
    const readiness = await readReadiness();
    return Response.json(readiness, { status: readiness.isReady ? 200 : 503, headers });
  } catch (error) {
    return problemOf(error, crypto.randomUUID());
  }
}
