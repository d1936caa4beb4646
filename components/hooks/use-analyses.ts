'use client';

import useSWR from 'swr';
import type { AnalysisRecipe, AnalysisView } from '@/lib/schemas/analyses';
import { answer } from './answer';
import { apiPath } from './api-path';
import { change, removeShown, requireSame } from './change';
import { request } from './request';

const POLL_MS = 1000;
/** Below the pace of asking: what SWR is asked again within this time it does not fetch. */
const FRESH_MS = POLL_MS / 2;

export function useAnalyses(collaboration: string, fallback?: AnalysisView[]) {
  return useSWR(
    apiPath(collaboration, 'analyses'),
    async (path) => (await request(path, answer('analysisListSchema'))).analyses,
    {
      fallbackData: fallback,
      dedupingInterval: FRESH_MS,
      // Before the first answer of its own SWR knows nothing of the fallback.
      refreshInterval: (list = fallback) =>
        list?.some((analysis) => analysis.state === 'running') ? POLL_MS : 0,
    },
  );
}

/** One analysis with its runs; asked for every second while one of them is on its way. */
export function useAnalysis(collaboration: string, key: string, fallback?: AnalysisView) {
  return useSWR(
    apiPath(collaboration, 'analyses', key),
    (path) => request(path, answer('analysisSchema')),
    {
      fallbackData: fallback,
      dedupingInterval: FRESH_MS,
      refreshInterval: (analysis = fallback) => (analysis?.state === 'running' ? POLL_MS : 0),
    },
  );
}

export function createAnalysis(
  collaboration: string,
  body: { name: string; recipe: AnalysisRecipe },
): Promise<AnalysisView> {
  return request(apiPath(collaboration, 'analyses'), answer('analysisSchema'), {
    method: 'POST',
    body,
  });
}

/** @throws ChangedMeanwhile where the recipe is not the one that was opened */
export function requireRecipe(collaboration: string, key: string, opened: AnalysisRecipe) {
  return requireSame(apiPath(collaboration, 'analyses', key), answer('analysisSchema'), {
    part: (analysis) => analysis.recipe,
    opened,
  });
}

export function changeRecipe(
  collaboration: string,
  key: string,
  opened: AnalysisRecipe,
  recipe: AnalysisRecipe,
): Promise<AnalysisView> {
  return change(apiPath(collaboration, 'analyses', key), answer('analysisSchema'), {
    part: (analysis) => analysis.recipe,
    opened,
    body: { recipe },
    answer: answer('analysisSchema'),
  });
}

/** @throws ChangedMeanwhile where the name is not the one that was opened */
export function renameAnalysis(
  collaboration: string,
  key: string,
  opened: Pick<AnalysisView, 'name'>,
  body: Pick<AnalysisView, 'name'>,
): Promise<AnalysisView> {
  return change(apiPath(collaboration, 'analyses', key), answer('analysisSchema'), {
    part: ({ name }) => ({ name }),
    opened,
    body,
    answer: answer('analysisSchema'),
  });
}

export type NameAndRecipe = Pick<AnalysisView, 'name' | 'recipe'>;

const nameAndRecipe = ({ name, recipe }: NameAndRecipe): NameAndRecipe => ({ name, recipe });

/** Changes name and recipe. @throws ChangedMeanwhile where they are not those that were opened */
export function changeAnalysis(
  collaboration: string,
  key: string,
  opened: NameAndRecipe,
  body: NameAndRecipe,
): Promise<AnalysisView> {
  return change(apiPath(collaboration, 'analyses', key), answer('analysisSchema'), {
    part: nameAndRecipe,
    opened: nameAndRecipe(opened),
    body,
    answer: answer('analysisSchema'),
  });
}

export function copyAnalysis(
  collaboration: string,
  key: string,
  body: { name?: string; detections?: AnalysisRecipe['detections'] } = {},
): Promise<AnalysisView> {
  return request(apiPath(collaboration, 'analyses', key, 'copy'), answer('analysisSchema'), {
    method: 'POST',
    body,
  });
}

/** @throws ChangedMeanwhile where the recipe is not the one that was shown */
export function removeAnalysis(
  collaboration: string,
  key: string,
  shown: AnalysisRecipe,
): Promise<void> {
  return removeShown(apiPath(collaboration, 'analyses', key), answer('analysisSchema'), {
    part: (analysis) => analysis.recipe,
    opened: shown,
  });
}
