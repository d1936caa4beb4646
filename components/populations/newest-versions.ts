import { answer } from '@/components/hooks/answer';
import { apiPath } from '@/components/hooks/api-path';
import { request } from '@/components/hooks/request';
import type { ListedPopulation } from '@/lib/schemas/populations';

/** Each population by its newest version, as the server holds them now. */
export async function newestVersions(collaboration: string): Promise<ListedPopulation[]> {
  const path = apiPath(collaboration, 'populations');
  return newestOfEach((await request(path, answer('populationListSchema'))).populations);
}

/** The list comes newest version first: the first of each number is the newest. */
export function newestOfEach(versions: ListedPopulation[]): ListedPopulation[] {
  const seen = new Set<number>();
  return versions.filter((version) => {
    if (seen.has(version.number)) return false;
    seen.add(version.number);
    return true;
  });
}
