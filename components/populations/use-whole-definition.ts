'use client';

import useSWR from 'swr';
import { answer } from '@/components/hooks/answer';
import { apiPath, withQuery } from '@/components/hooks/api-path';
import { request } from '@/components/hooks/request';
import type { Population } from '@/lib/population';
import type { ListedPopulation } from '@/lib/schemas/populations';

/** The definition of a version; lists hold tabulated systems as a summary, so they are fetched. */
export function useWholeDefinition(
  collaboration: string,
  listed: ListedPopulation | undefined,
): { definition: Population | undefined; fault: unknown } {
  const isSystems = listed?.definition.form === 'systems';
  const { data, error } = useSWR(
    listed && isSystems
      ? withQuery(apiPath(collaboration, 'populations', listed.key), { version: listed.version })
      : null,
    async (path: string) => (await request(path, answer('populationSchema'))).definition,
    { revalidateIfStale: false, revalidateOnFocus: false, revalidateOnReconnect: false },
  );
  const own = listed?.definition;
  return { definition: own?.form === 'systems' ? data : own, fault: error as unknown };
}
