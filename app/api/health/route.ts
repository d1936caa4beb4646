import { problemOf } from '@/app/api/v1/problem';
import { readHealth } from '@/lib/services/health';

/** Asked before the build knows a database: never made in advance. */
export const dynamic = 'force-dynamic';

export async function GET(): Promise<Response> {
  const headers = { 'Cache-Control': 'no-store', 'X-Content-Type-Options': 'nosniff' };
  try {
    return Response.json(await readHealth(), { headers });
  } catch (error) {
    return problemOf(error, crypto.randomUUID());
  }
}
