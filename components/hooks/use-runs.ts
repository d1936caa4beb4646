'use client';

import useSWR from 'swr';
import { z } from 'zod';
import { jobSchema } from '@/lib/schemas/jobs';
import { type RunSummary, type RunView, runSchema, runSummarySchema } from '@/lib/schemas/runs';
import { apiPath } from './api-path';
import { request } from './request';

export const runListSchema = z.object({ runs: z.array(runSummarySchema) });

/** A run never changes once it is finished, so it is fetched once. */
export function useRun(collaboration: string, id: string | undefined, fallback?: RunView) {
  return useSWR(
    id === undefined ? null : apiPath(collaboration, 'runs', id),
    (path) => request(path, runSchema),
    {
      fallbackData: fallback?.id === id ? fallback : undefined,
      revalidateIfStale: false,
      revalidateOnFocus: false,
      revalidateOnReconnect: false,
    },
  );
}

export function fetchRun(collaboration: string, id: string): Promise<RunView> {
  return request(apiPath(collaboration, 'runs', id), runSchema);
}

export function startRun(collaboration: string, analysis: string): Promise<RunSummary> {
  return request(apiPath(collaboration, 'analyses', analysis, 'runs'), runSummarySchema, {
    method: 'POST',
    body: {},
  });
}

export function cancelJob(collaboration: string, id: string) {
  return request(apiPath(collaboration, 'jobs', id, 'cancel'), jobSchema, {
    method: 'POST',
    body: {},
  });
}

export function retryJob(collaboration: string, id: string) {
  return request(apiPath(collaboration, 'jobs', id, 'retry'), jobSchema, {
    method: 'POST',
    body: {},
  });
}
