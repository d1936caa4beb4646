'use client';

import useSWR from 'swr';

const once = { revalidateIfStale: false, revalidateOnFocus: false, revalidateOnReconnect: false };

/**
 * Code without which a screen can be drawn, fetched once the screen stands; undefined until then.
 * A fetch that failed is tried again.
 *
 * @param name of the code, the same for all who share it
 */
export function useLoaded<Loaded>(name: string, load: () => Promise<Loaded>): Loaded | undefined {
  return useSWR(['code', name], load, once).data;
}
