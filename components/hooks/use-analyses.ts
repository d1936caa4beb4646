'use client';

import useSWR from 'swr';
import { z } from 'zod';
import { type AnalysisRecipe, type AnalysisView, analysisSchema } from '@/lib/schemas/analyses';
import { apiPath } from './api-path';
import { request, requestNothing } from './request';

export const analysisListSchema = z.object({ analyses: z.array(analysisSchema) });

const POLL_MS = 1000;

export function useAnalyses(collaboration: string, fallback?: AnalysisView[]) {
  return useSWR(
    apiPath(collaboration, 'analyses'),
    async (path) => (await request(path, analysisListSchema)).analyses,
    {
      fallbackData: fallback,
      // Before the first answer of its own SWR knows nothing of the fallback.
      refreshInterval: (list = fallback) =>
        list?.some((analysis) => analysis.state === 'running') ? POLL_MS : 0,
    },
  );
}

/** One analysis with its runs; asked for every second while one of them is on its way. */
export function useAnalysis(collaboration: string, key: string, fallback?: AnalysisView) {
  return useSWR(apiPath(collaboration, 'analyses', key), (path) => request(path, analysisSchema), {
    fallbackData: fallback,
    refreshInterval: (analysis = fallback) => (analysis?.state === 'running' ? POLL_MS : 0),
  });
}

export function createAnalysis(
  collaboration: string,
  body: { name: string; recipe: AnalysisRecipe },
): Promise<AnalysisView> {
  return request(apiPath(collaboration, 'analyses'), analysisSchema, { method: 'POST', body });
}

export function updateAnalysis(
  collaboration: string,
  key: string,
  body: { name?: string; recipe?: AnalysisRecipe },
): Promise<AnalysisView> {
  return request(apiPath(collaboration, 'analyses', key), analysisSchema, {
    method: 'PATCH',
    body,
  });
}

export function copyAnalysis(
  collaboration: string,
  key: string,
  body: { name?: string; detections?: AnalysisRecipe['detections'] } = {},
): Promise<AnalysisView> {
  return request(apiPath(collaboration, 'analyses', key, 'copy'), analysisSchema, {
    method: 'POST',
    body,
  });
}

export function removeAnalysis(collaboration: string, key: string): Promise<void> {
  return requestNothing(apiPath(collaboration, 'analyses', key), { method: 'DELETE' });
}
