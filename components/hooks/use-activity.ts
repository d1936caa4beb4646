'use client';

import type { ActivityPage, ActivityQuery } from '@/lib/schemas/activity';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { request } from './request';

export type ActivityFilter = Partial<Pick<ActivityQuery, 'kind' | 'person' | 'item' | 'for'>>;

/** The entries that follow those of an earlier answer. */
export function fetchEarlier(
  collaboration: string,
  filter: ActivityFilter,
  cursor: string,
): Promise<ActivityPage> {
  return request(
    withQuery(apiPath(collaboration, 'activity'), { ...filter, cursor }),
    answer('activityPageSchema'),
  );
}
