'use client';

import useSWR from 'swr';
import type { z } from 'zod';
import type {
  addObservationSchema,
  CandidateDetail,
  CandidateList,
  CompanionStatus,
  giveVerdictSchema,
} from '@/lib/schemas/candidates';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { request, requestNothing } from './request';

/** Most rows that the list shows at once. */
export const CANDIDATES_SHOWN = 500;

/** Candidates of all surveys, open ones first, under a filter. */
export function useCandidates(
  collaboration: string,
  filter: { survey?: string; status?: CompanionStatus },
  fallback?: CandidateList,
) {
  const query = { ...filter, limit: CANDIDATES_SHOWN };
  return useSWR(
    withQuery(apiPath(collaboration, 'candidates'), query),
    (path) => request(path, answer('candidateListSchema')),
    { fallbackData: fallback, keepPreviousData: true },
  );
}

export function useCandidate(collaboration: string, fallback: CandidateDetail) {
  return useSWR(
    apiPath(collaboration, 'candidates', fallback.id),
    (path) => request(path, answer('candidateDetailSchema')),
    { fallbackData: fallback },
  );
}

export function addObservation(
  collaboration: string,
  id: string,
  body: z.input<typeof addObservationSchema>,
): Promise<CandidateDetail> {
  const path = apiPath(collaboration, 'candidates', id, 'observations');
  return request(path, answer('candidateDetailSchema'), { method: 'POST', body });
}

export function removeObservation(
  collaboration: string,
  id: string,
  observationId: string,
): Promise<void> {
  return requestNothing(apiPath(collaboration, 'candidates', id, 'observations', observationId), {
    method: 'DELETE',
  });
}

export function giveVerdict(
  collaboration: string,
  id: string,
  body: z.input<typeof giveVerdictSchema>,
): Promise<CandidateDetail> {
  const path = apiPath(collaboration, 'candidates', id, 'verdicts');
  return request(path, answer('candidateDetailSchema'), { method: 'POST', body });
}
