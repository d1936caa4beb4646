'use client';

import useSWR from 'swr';
import type {
  AdoptedQuantity,
  AdoptionChoices,
  AdoptionPreview,
  AdoptMany,
  StarList,
  ValueTableView,
} from '@/lib/schemas/stars';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { request } from './request';

/** Stars whose surveys disagree in one quantity and for which nothing was adopted. */
export function useConflicts(collaboration: string, quantity: AdoptedQuantity, fallback: StarList) {
  const query = { only: `${quantity}-conflict`, offset: 0, limit: 100 };
  return useSWR(
    withQuery(apiPath(collaboration, 'stars'), query),
    (path) => request(path, answer('starListSchema')),
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

/** Adopts values of one star or of several in one new table. */
export async function adoptValues(
  collaboration: string,
  body: AdoptMany,
): Promise<ValueTableView[]> {
  const path = apiPath(collaboration, 'value-tables');
  return (await request(path, answer('valueTablesSchema'), { method: 'POST', body })).tables;
}

/** How the limit of the lead analysis would move; nothing is stored. */
export function previewAdoption(
  collaboration: string,
  body: AdoptionChoices,
): Promise<AdoptionPreview> {
  const path = apiPath(collaboration, 'value-tables', 'preview');
  return request(path, answer('adoptionPreviewSchema'), { method: 'POST', body });
}
