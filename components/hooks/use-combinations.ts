'use client';

import useSWR from 'swr';
import type {
  CombinationDefinition,
  CombinationPreview,
  CombinationView,
  CreateCombination,
} from '@/lib/schemas/combinations';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request } from './request';

/** Every version of every combination, the newest first. */
export function useCombinations(collaboration: string, fallback?: CombinationView[]) {
  return useSWR(
    apiPath(collaboration, 'combinations'),
    async (path) => (await request(path, answer('combinationsAnswerSchema'))).combinations,
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

/** What a combination would hold; the last answer stays while the next is on its way. */
export function useCombinationPreview(
  collaboration: string,
  definition: CombinationDefinition | undefined,
  fallback?: CombinationPreview,
) {
  const path = apiPath(collaboration, 'combinations', 'preview');
  return useSWR<CombinationPreview>(
    definition ? [path, JSON.stringify(definition)] : null,
    () =>
      request(path, answer('combinationPreviewSchema'), { method: 'POST', body: { definition } }),
    {
      keepPreviousData: true,
      revalidateOnFocus: false,
      fallbackData: fallback,
      revalidateIfStale: fallback === undefined,
    },
  );
}

export function createCombination(
  collaboration: string,
  body: CreateCombination,
): Promise<CombinationView> {
  return request(apiPath(collaboration, 'combinations'), answer('combinationSchema'), {
    method: 'POST',
    body,
  });
}
