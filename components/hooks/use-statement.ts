import type { StatementQuery } from '@/lib/schemas/statement';
import { apiPath } from './api-path';
import { requestBytes } from './request';

/** A recorded limit with its conditions, written by the server: text, LaTeX or JSON. */
export async function fetchStatement(
  collaboration: string,
  runId: string,
  choice: StatementQuery,
): Promise<string> {
  const given = Object.entries(choice).filter(([, value]) => value !== undefined);
  const query = new URLSearchParams(given.map(([name, value]) => [name, String(value)]));
  const bytes = await requestBytes(
    `${apiPath(collaboration, 'runs', runId, 'statement')}?${query}`,
  );
  return new TextDecoder().decode(bytes);
}
