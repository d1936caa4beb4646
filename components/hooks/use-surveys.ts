'use client';

import useSWR from 'swr';
import type { z } from 'zod';
import type { JobView } from '@/lib/schemas/jobs';
import type { MapView } from '@/lib/schemas/sensitivity';
import type {
  CompanionView,
  createSurveySchema,
  MarkTarget,
  SurveyList,
  SurveyView,
  TargetList,
  TargetView,
  updateSurveySchema,
} from '@/lib/schemas/surveys';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { change, pick } from './change';
import { request } from './request';

type UpdateSurvey = z.input<typeof updateSurveySchema>;

const POLL_MS = 1500;
/** Below the pace of asking: what SWR is asked again within this time it does not fetch. */
const FRESH_MS = POLL_MS / 2;
const isComputing = (survey: SurveyView | undefined) =>
  survey?.mapJob?.status === 'running' || survey?.mapJob?.status === 'waiting';

export function useSurveys(collaboration: string, fallback: SurveyList) {
  return useSWR(
    apiPath(collaboration, 'surveys'),
    (path) => request(path, answer('surveyListSchema')),
    {
      fallbackData: fallback,
      dedupingInterval: FRESH_MS,
      refreshInterval: (list = fallback) => (list.surveys.some(isComputing) ? POLL_MS : 0),
    },
  );
}

/** One survey; asked for more often while its maps are being computed. */
export function useSurvey(collaboration: string, slug: string, fallback: SurveyView) {
  return useSWR(
    apiPath(collaboration, 'surveys', slug),
    (path) => request(path, answer('surveySchema')),
    {
      fallbackData: fallback,
      dedupingInterval: FRESH_MS,
      refreshInterval: (survey = fallback) => (isComputing(survey) ? POLL_MS : 0),
    },
  );
}

/**
 * Every target of a survey, page after page; refreshed while maps arrive.
 *
 * @param follow `stamp` changes with the survey's counts: the targets are then asked for once more,
 *   since the last maps may arrive between two looks
 */
export function useTargets(
  collaboration: string,
  slug: string,
  fallback: TargetList,
  follow: { isLive: boolean; stamp: string },
) {
  return useSWR(
    [apiPath(collaboration, 'surveys', slug, 'targets'), follow.stamp],
    async ([path]) => {
      const targets: TargetView[] = [];
      for (;;) {
        const page = await request(
          withQuery(path, { limit: 500, offset: targets.length }),
          answer('targetListSchema'),
        );
        targets.push(...page.targets);
        if (page.targets.length === 0 || targets.length >= page.total) {
          return { ...page, targets };
        }
      }
    },
    {
      fallbackData: fallback,
      keepPreviousData: true,
      refreshInterval: follow.isLive ? 2 * POLL_MS : 0,
      revalidateOnFocus: false,
    },
  );
}

export function useCompanions(collaboration: string, slug: string, fallback: CompanionView[]) {
  return useSWR(
    apiPath(collaboration, 'surveys', slug, 'companions'),
    async (path) => (await request(path, answer('companionsAnswerSchema'))).companions,
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

/** Companions and candidates of several surveys together. */
export function useCompanionsOf(collaboration: string, slugs: string[]) {
  return useSWR(
    slugs.length === 0 ? null : ['companions of', collaboration, ...slugs],
    async () => {
      const lists = await Promise.all(
        slugs.map((slug) =>
          request(
            apiPath(collaboration, 'surveys', slug, 'companions'),
            answer('companionsAnswerSchema'),
          ),
        ),
      );
      return lists.flatMap(({ companions }) => companions);
    },
    { revalidateOnFocus: false, keepPreviousData: true },
  );
}

/** One stored map; a map never changes. */
export function useMap(collaboration: string, id: string | null) {
  return useSWR<MapView>(
    id === null ? null : apiPath(collaboration, 'maps', id),
    (path: string) => request(path, answer('mapViewSchema')),
    { revalidateOnFocus: false, revalidateIfStale: false },
  );
}

export function useCoolingTables(collaboration: string) {
  return useSWR(
    apiPath(collaboration, 'cooling-tables'),
    async (path) => (await request(path, answer('coolingTablesAnswerSchema'))).coolingTables,
  );
}

export function createSurvey(
  collaboration: string,
  body: z.input<typeof createSurveySchema>,
): Promise<SurveyView> {
  return request(apiPath(collaboration, 'surveys'), answer('surveySchema'), {
    method: 'POST',
    body,
  });
}

/** Changes those parts of a survey that were opened. */
export function updateSurvey<Name extends keyof SurveyView & keyof UpdateSurvey>(
  collaboration: string,
  slug: string,
  opened: Pick<SurveyView, Name>,
  body: Pick<UpdateSurvey, Name>,
): Promise<SurveyView> {
  return change(apiPath(collaboration, 'surveys', slug), answer('surveySchema'), {
    part: (survey) => pick(survey, opened),
    opened,
    body,
    answer: answer('surveySchema'),
  });
}

export function startMaps(collaboration: string, slug: string): Promise<JobView> {
  return request(apiPath(collaboration, 'surveys', slug, 'maps'), answer('jobSchema'), {
    method: 'POST',
  });
}

/** Leaves a target out with a reason, takes it back in, or marks how it was chosen. */
export function markTarget<Name extends keyof TargetView & keyof MarkTarget>(
  collaboration: string,
  id: string,
  opened: Pick<TargetView, Name>,
  body: Pick<MarkTarget, Name>,
): Promise<TargetView> {
  return change(apiPath(collaboration, 'targets', id), answer('targetSchema'), {
    part: (target) => pick(target, opened),
    opened,
    body,
    answer: answer('targetSchema'),
  });
}
