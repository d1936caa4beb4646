import { problemOf } from '@/app/api/v1/problem';
import { readMetrics } from '@/lib/services/metrics';

export const dynamic = 'force-dynamic';

export async function GET(request: Request): Promise<Response> {
  try {
    const { text, contentType } = await readMetrics(request.headers.get('authorization'));
    return new Response(text, {
      headers: { 'Content-Type': contentType, 'Cache-Control': 'no-store' },
    });
  } catch (error) {
    return problemOf(error, crypto.randomUUID());
  }
}
