'use client';

import useSWR from 'swr';
import type {
  CreateSample,
  SampleDefinition,
  SamplePreview,
  SampleView,
} from '@/lib/schemas/samples';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request } from './request';

/** Every version of every sample, the newest first. */
export function useSamples(collaboration: string, fallback?: SampleView[]) {
  return useSWR(
    apiPath(collaboration, 'samples'),
    async (path) => (await request(path, answer('samplesAnswerSchema'))).samples,
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

/**
 * What a selection holds now; the last answer stays while the next is on its way.
 *
 * @param definition undefined while the form holds something that is no selection
 * @param surveyIds the surveys that an analysis is to use; all when absent
 */
export function useSamplePreview(
  collaboration: string,
  definition: SampleDefinition | undefined,
  surveyIds?: string[],
) {
  const path = apiPath(collaboration, 'samples', 'preview');
  return useSWR<SamplePreview>(
    definition && surveyIds?.length !== 0 ? [path, JSON.stringify([definition, surveyIds])] : null,
    () =>
      request(path, answer('samplePreviewSchema'), {
        method: 'POST',
        body: { definition, surveyIds },
      }),
    { keepPreviousData: true, revalidateOnFocus: false },
  );
}

export function createSample(collaboration: string, body: CreateSample): Promise<SampleView> {
  return request(apiPath(collaboration, 'samples'), answer('sampleSchema'), {
    method: 'POST',
    body,
  });
}
