'use client';

import useSWR from 'swr';
import type { LeavingView } from '@/lib/schemas/leaving';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request, requestFile, requestNothing } from './request';

const LOOK_AGAIN_MS = 3000;

/** Archives and the deletion of a collaboration; asked again while an archive is being made. */
export function useLeaving(collaboration: string, fallback: LeavingView) {
  return useSWR(
    apiPath(collaboration, 'leaving'),
    (path) => request(path, answer('leavingSchema')),
    {
      fallbackData: fallback,
      refreshInterval: (view) =>
        view?.exports.some(({ status }) => status === 'waiting' || status === 'running')
          ? LOOK_AGAIN_MS
          : 0,
    },
  );
}

export const askForExport = (collaboration: string) =>
  request(apiPath(collaboration, 'leaving', 'exports'), answer('leavingSchema'), {
    method: 'POST',
  });

export const exportAddress = (collaboration: string, id: string) =>
  apiPath(collaboration, 'leaving', 'exports', id);

export const askForDeletion = (collaboration: string, name: string) =>
  request(apiPath(collaboration, 'leaving', 'deletion'), answer('leavingSchema'), {
    method: 'POST',
    body: { name },
  });

export const cancelDeletion = (collaboration: string) =>
  request(apiPath(collaboration, 'leaving', 'deletion'), answer('leavingSchema'), {
    method: 'DELETE',
  });

export const fetchOwnData = () => requestFile('/api/v1/me/data', {});

export const deleteAccount = (password: string) =>
  requestNothing('/api/v1/me/deletion', { method: 'POST', body: { password } });
