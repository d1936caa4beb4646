'use client';

import useSWR from 'swr';
import type { DepositView } from '@/lib/schemas/deposits';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request } from './request';

const LOOK_AGAIN_MS = 2000;

/** The copy of a release in an open repository; asked again while it is on its way. */
export function useDeposit(collaboration: string, releaseId: string, fallback: DepositView) {
  return useSWR(
    apiPath(collaboration, 'releases', releaseId, 'deposit'),
    (path) => request(path, answer('depositSchema')),
    {
      fallbackData: fallback,
      refreshInterval: (view) =>
        view?.state === 'waiting' || view?.state === 'running' ? LOOK_AGAIN_MS : 0,
    },
  );
}

export const sendDeposit = (collaboration: string, releaseId: string) =>
  request(apiPath(collaboration, 'releases', releaseId, 'deposit'), answer('depositSchema'), {
    method: 'POST',
  });
