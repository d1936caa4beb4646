'use client';

import useSWR from 'swr';
import type { Overview } from '@/lib/schemas/overview';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request } from './request';

/** Where the collaboration stands; asked for more often while something is being computed. */
export function useOverview(collaboration: string, fallback: Overview) {
  return useSWR(
    apiPath(collaboration, 'overview'),
    (path) => request(path, answer('overviewSchema')),
    {
      fallbackData: fallback,
      refreshInterval: (overview = fallback) => (overview.jobs.length > 0 ? 2000 : 30_000),
    },
  );
}
