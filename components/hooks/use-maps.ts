'use client';

import useSWR from 'swr';
import type { MapStore } from '@/lib/schemas/map-states';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request } from './request';

const POLL_MS = 2000;

/** The map of each target of a survey against what it should be now; followed while maps arrive. */
export function useSurveyMaps(collaboration: string, slug: string, stamp = '') {
  return useSWR(
    [apiPath(collaboration, 'surveys', slug, 'maps'), stamp],
    ([path]) => request(path, answer('surveyMapsSchema')),
    {
      keepPreviousData: true,
      revalidateOnFocus: false,
      refreshInterval: (answer) =>
        answer?.job?.status === 'running' || answer?.job?.status === 'waiting' ? POLL_MS : 0,
    },
  );
}

/** How the maps of every survey stand. */
export function useMapStore(collaboration: string, fallback: MapStore) {
  return useSWR(apiPath(collaboration, 'maps'), (path) => request(path, answer('mapStoreSchema')), {
    fallbackData: fallback,
    revalidateOnFocus: false,
  });
}
