'use client';

import useSWR from 'swr';
import type { DrawnRun, RunSummary } from '@/lib/schemas/runs';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request } from './request';

/** A run never changes once it is finished, so it is fetched once. */
export function useRun(collaboration: string, id: string | undefined, fallback?: DrawnRun) {
  return useSWR<DrawnRun>(
    id === undefined ? null : apiPath(collaboration, 'runs', id),
    (path) => request(path, answer('runSchema')),
    {
      fallbackData: fallback?.id === id ? fallback : undefined,
      revalidateIfStale: false,
      revalidateOnFocus: false,
      revalidateOnReconnect: false,
    },
  );
}

export function fetchRun(collaboration: string, id: string): Promise<DrawnRun> {
  return request(apiPath(collaboration, 'runs', id), answer('runSchema'));
}

export function startRun(collaboration: string, analysis: string): Promise<RunSummary> {
  return request(apiPath(collaboration, 'analyses', analysis, 'runs'), answer('runSummarySchema'), {
    method: 'POST',
    body: {},
  });
}

export function cancelJob(collaboration: string, id: string) {
  return request(apiPath(collaboration, 'jobs', id, 'cancel'), answer('jobSchema'), {
    method: 'POST',
    body: {},
  });
}

export function retryJob(collaboration: string, id: string) {
  return request(apiPath(collaboration, 'jobs', id, 'retry'), answer('jobSchema'), {
    method: 'POST',
    body: {},
  });
}
