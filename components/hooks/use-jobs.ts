'use client';

import useSWR from 'swr';
import type { JobView } from '@/lib/schemas/jobs';
import { answer } from './answer';
import { apiPath } from './api-path';
import { ApiProblem } from './api-problem';
import { request } from './request';

const isOpen = (job: JobView) => job.status === 'waiting' || job.status === 'running';

const BUSY_MS = 2000;
const QUIET_MS = 10_000;
const FAILED_MS = 5000;

/**
 * The newest jobs of the collaboration, open ones first; asked for more often while there are any.
 * The bar asks on every page, so its answer also tells whether the server and the session are there.
 */
export function useJobs(collaboration: string) {
  const { data, error, mutate } = useSWR(
    apiPath(collaboration, 'jobs'),
    async (path) => (await request(path, answer('jobsSchema'))).jobs,
    {
      refreshInterval: (jobs) => (jobs?.some(isOpen) ? BUSY_MS : QUIET_MS),
      onErrorRetry: (_, _key, _config, revalidate, { retryCount }) => {
        setTimeout(() => void revalidate({ retryCount }), FAILED_MS);
      },
    },
  );
  const status = error instanceof ApiProblem ? error.status : undefined;
  const lost: 'session' | 'connection' | undefined =
    status === 401 ? 'session' : status === 0 ? 'connection' : undefined;
  return { jobs: data, lost, mutate };
}
