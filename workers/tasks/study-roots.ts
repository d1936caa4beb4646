import { select } from '@/lib/queue/statement';

/**
 * The star that each star of an earlier run is by now: joined stars have their targets under one.
 *
 * @returns for each id the id under which its targets are listed
 */
export async function currentStars(starIds: readonly string[]): Promise<Map<string, string>> {
  const rows = await select<{ id: string; root: string }>(
    'select id, root_of_star(id) as root from unnest($1::uuid[]) as id',
    [[...starIds]],
  );
  return new Map(rows.map(({ id, root }) => [id, root]));
}
