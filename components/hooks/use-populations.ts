'use client';

import useSWR from 'swr';
import type {
  CreatePopulation,
  ListedPopulation,
  PopulationDefinition,
  PopulationView,
} from '@/lib/schemas/populations';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { change } from './change';
import { request } from './request';

/** Every version that the person may see, newest first. */
export function usePopulations(collaboration: string, fallback?: ListedPopulation[]) {
  return useSWR(
    apiPath(collaboration, 'populations'),
    async (path) => (await request(path, answer('populationListSchema'))).populations,
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

export function createPopulation(
  collaboration: string,
  population: CreatePopulation,
): Promise<PopulationView> {
  return request(apiPath(collaboration, 'populations'), answer('populationSchema'), {
    method: 'POST',
    body: population,
  });
}

export interface NewVersion {
  note?: string;
  definition: PopulationDefinition;
}

/** Indices are sent as they are stored, per natural logarithm, and named so. */
export function savePopulationVersion(
  collaboration: string,
  key: string,
  version: NewVersion,
): Promise<PopulationView> {
  return request(
    apiPath(collaboration, 'populations', key, 'versions'),
    answer('populationSchema'),
    {
      method: 'POST',
      body: { ...version, convention: 'log' },
    },
  );
}

/** Whether all may rest on a version; its definition stays as it is. */
export function sharePopulation(
  collaboration: string,
  key: string,
  version: number,
  isShared: boolean,
): Promise<PopulationView> {
  const path = withQuery(apiPath(collaboration, 'populations', key), { version });
  return change(path, answer('populationSchema'), {
    part: (population) => population.isShared,
    opened: !isShared,
    body: { isShared },
    answer: answer('populationSchema'),
  });
}
