'use client';

import useSWR from 'swr';
import { z } from 'zod';
import { type JobView, jobSchema } from '@/lib/schemas/jobs';
import { apiPath, withQuery } from './api-path';
import { request } from './request';

const jobsSchema = z.object({ jobs: z.array(jobSchema) });

const isOpen = (job: JobView) => job.status === 'waiting' || job.status === 'running';

/** Jobs of the collaboration that are waiting or running; asked for more often while there are any. */
export function useOpenJobs(collaboration: string) {
  const { data } = useSWR(
    withQuery(apiPath(collaboration, 'jobs'), { limit: 50 }),
    async (path) => (await request(path, jobsSchema)).jobs.filter(isOpen),
    { refreshInterval: (jobs) => (jobs && jobs.length > 0 ? 2000 : 10_000) },
  );
  return data ?? [];
}

/** One job, asked for every second until it has ended. */
export function useJob(collaboration: string, id: string | null, fallback?: JobView) {
  return useSWR(
    id === null ? null : apiPath(collaboration, 'jobs', id),
    (path: string) => request(path, jobSchema),
    { fallbackData: fallback, refreshInterval: (job) => (job && !isOpen(job) ? 0 : 1000) },
  );
}
