'use client';

import useSWR from 'swr';
import type { Adoption, Overlaps, StarList, StarPage, StarView } from '@/lib/schemas/stars';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { request } from './request';

/** Most stars of one answer. */
const PAGE = 500;

/** Every star, page after page; those of the first page are there from the beginning. */
export function useAllStars(collaboration: string, fallback: StarList) {
  return useSWR(
    apiPath(collaboration, 'stars'),
    async (path) => {
      const stars: StarView[] = [];
      for (;;) {
        const page = await request(
          withQuery(path, { limit: PAGE, offset: stars.length }),
          answer('starListSchema'),
        );
        stars.push(...page.stars);
        if (page.stars.length === 0 || stars.length >= page.total) return { ...page, stars };
      }
    },
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

export function useStar(collaboration: string, id: string, fallback: StarPage) {
  return useSWR(
    apiPath(collaboration, 'stars', id),
    (path) => request(path, answer('starPageSchema')),
    // Maps follow an adopted value after some time.
    {
      fallbackData: fallback,
      refreshInterval: (star = fallback) =>
        star.entries.some(({ mapState }) => mapState === 'waiting') ? 1500 : 0,
    },
  );
}

export function useOverlaps(collaboration: string, fallback: Overlaps) {
  return useSWR(
    apiPath(collaboration, 'stars', 'overlaps'),
    (path) => request(path, answer('overlapsSchema')),
    { fallbackData: fallback },
  );
}

export type Verdict = 'confirm' | 'refuse' | 'undo';

export function decidePair(
  collaboration: string,
  pair: string,
  verdict: Verdict,
  why: string,
): Promise<Overlaps> {
  const path = apiPath(collaboration, 'stars', 'overlaps', pair, verdict);
  return request(path, answer('overlapsSchema'), { method: 'POST', body: { why } });
}

/** Takes the stars of several pairs for one each: all pairs or none. */
export function confirmPairs(
  collaboration: string,
  pairs: string[],
  why: string,
): Promise<Overlaps> {
  const path = apiPath(collaboration, 'stars', 'overlaps', 'confirm');
  return request(path, answer('overlapsSchema'), { method: 'POST', body: { pairs, why } });
}

export async function proposePairs(collaboration: string): Promise<number> {
  const path = apiPath(collaboration, 'stars', 'overlaps');
  return (await request(path, answer('proposedSchema'), { method: 'POST' })).proposed;
}

export function adoptValue(collaboration: string, star: string, body: Adoption): Promise<StarPage> {
  const path = apiPath(collaboration, 'stars', star, 'adopt');
  return request(path, answer('starPageSchema'), { method: 'POST', body });
}

export function splitStar(
  collaboration: string,
  star: string,
  body: { targetId: string; why: string },
): Promise<StarPage> {
  const path = apiPath(collaboration, 'stars', star, 'split');
  return request(path, answer('starPageSchema'), { method: 'POST', body });
}
