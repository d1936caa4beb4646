'use client';

import useSWR from 'swr';
import { answer } from './answer';
import { request } from './request';

/** A word's definition; it is part of the product and never changes while a page is open. */
export function useHelp(word: string) {
  return useSWR(
    `/help/${word}/definition`,
    (path) => request(path, answer('helpDefinitionSchema')),
    {
      revalidateIfStale: false,
      revalidateOnFocus: false,
      revalidateOnReconnect: false,
    },
  );
}
