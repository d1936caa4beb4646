'use client';

import useSWR from 'swr';
import type { WorkView } from '@/lib/schemas/work';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request } from './request';

const REFRESH_MS = 5000;

/** Queue and workers as an owner sees them, asked for anew as often as a worker shows that it lives. */
export function useWork(collaboration: string, fallback: WorkView) {
  return useSWR(apiPath(collaboration, 'work'), (path) => request(path, answer('workSchema')), {
    fallbackData: fallback,
    refreshInterval: REFRESH_MS,
  });
}
