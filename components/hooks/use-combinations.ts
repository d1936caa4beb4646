'use client';

import useSWR from 'swr';
import { z } from 'zod';
import {
  type CombinationDefinition,
  type CombinationPreview,
  type CombinationView,
  type CreateCombination,
  combinationPreviewSchema,
  combinationSchema,
} from '@/lib/schemas/combinations';
import { apiPath } from './api-path';
import { request } from './request';

/** Every version of every combination, the newest first. */
export function useCombinations(collaboration: string, fallback?: CombinationView[]) {
  return useSWR(
    apiPath(collaboration, 'combinations'),
    async (path) =>
      (await request(path, z.object({ combinations: z.array(combinationSchema) }))).combinations,
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

/** What a combination would hold; the last answer stays while the next is on its way. */
export function useCombinationPreview(
  collaboration: string,
  definition: CombinationDefinition | undefined,
) {
  const path = apiPath(collaboration, 'combinations', 'preview');
  return useSWR<CombinationPreview>(
    definition ? [path, JSON.stringify(definition)] : null,
    () => request(path, combinationPreviewSchema, { method: 'POST', body: { definition } }),
    { keepPreviousData: true, revalidateOnFocus: false },
  );
}

export function createCombination(
  collaboration: string,
  body: CreateCombination,
): Promise<CombinationView> {
  return request(apiPath(collaboration, 'combinations'), combinationSchema, {
    method: 'POST',
    body,
  });
}
