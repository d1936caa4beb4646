'use client';

import useSWR from 'swr';
import { helpDefinitionSchema } from '@/lib/schemas/help';
import { request } from './request';

/** A word's definition; it is part of the product and never changes while a page is open. */
export function useHelp(word: string) {
  return useSWR(`/help/${word}/definition`, (path) => request(path, helpDefinitionSchema), {
    revalidateIfStale: false,
    revalidateOnFocus: false,
    revalidateOnReconnect: false,
  });
}
