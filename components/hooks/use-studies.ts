'use client';

import useSWR from 'swr';
import type { JobView } from '@/lib/schemas/jobs';
import type { StudySummary, StudyView } from '@/lib/schemas/studies';
import type { StudyKind, StudySettings } from '@/lib/schemas/study-settings';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { request, requestNothing } from './request';

const POLL_MS = 1000;
/** Below the pace of asking: what SWR is asked again within this time it does not fetch. */
const FRESH_MS = POLL_MS / 2;

const isOpen = ({ status }: JobView) => status === 'waiting' || status === 'running';
/** Given as an arrow of each render: the same function twice would not be asked after new data. */
const pollWhileOpen = (studies: StudySummary[] | undefined) =>
  studies?.some(({ job }) => isOpen(job)) ? POLL_MS : 0;

async function fetchStudies(path: string): Promise<StudySummary[]> {
  return (await request(path, answer('studyListSchema'))).studies;
}

/** Questions asked of a run, newest first; asked for every second while one is on its way. */
export function useRunStudies(collaboration: string, runId: string | undefined) {
  return useSWR(
    runId === undefined ? null : apiPath(collaboration, 'runs', runId, 'studies'),
    fetchStudies,
    { dedupingInterval: FRESH_MS, refreshInterval: (studies) => pollWhileOpen(studies) },
  );
}

/** Questions of one kind asked in the collaboration, newest first. */
export function useStudiesOfKind(
  collaboration: string,
  kind: StudyKind,
  fallback?: StudySummary[],
) {
  return useSWR(withQuery(apiPath(collaboration, 'studies'), { kind }), fetchStudies, {
    fallbackData: fallback,
    dedupingInterval: FRESH_MS,
    refreshInterval: (studies) => pollWhileOpen(studies),
  });
}

/** One question with its answer, which never changes once it is there. */
export function useStudy(collaboration: string, id: string | undefined, first?: StudyView) {
  const fallback = first?.id === id ? first : undefined;
  return useSWR(
    id === undefined ? null : apiPath(collaboration, 'studies', id),
    (path) => request(path, answer('studySchema')),
    {
      fallbackData: fallback,
      dedupingInterval: FRESH_MS,
      revalidateIfStale: fallback?.job.status !== 'done',
      refreshInterval: (study) => (study && isOpen(study.job) ? POLL_MS : 0),
      revalidateOnFocus: false,
    },
  );
}

/** The same settings asked of the same run again answer the existing question. */
export function askStudy(
  collaboration: string,
  runId: string,
  settings: StudySettings,
): Promise<StudySummary> {
  return request(apiPath(collaboration, 'runs', runId, 'studies'), answer('studySummarySchema'), {
    method: 'POST',
    body: settings,
  });
}

export function removeStudy(collaboration: string, id: string): Promise<void> {
  return requestNothing(apiPath(collaboration, 'studies', id), { method: 'DELETE' });
}
