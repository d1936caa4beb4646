'use client';

import useSWR from 'swr';
import type { SessionView } from '@/lib/schemas/account';
import { answer } from './answer';
import { change } from './change';
import { request, requestNothing } from './request';

const SESSIONS = '/api/v1/me/sessions';

export function changeName(opened: string, name: string) {
  return change('/api/v1/me', answer('meSchema'), {
    part: ({ person }) => person.name,
    opened,
    body: { name },
    answer: answer('meSchema'),
  });
}

/** Other sessions end; this one stays. */
export function changePassword(currentPassword: string, newPassword: string) {
  return requestNothing('/api/v1/me/password', {
    method: 'POST',
    body: { currentPassword, newPassword },
  });
}

export const unlinkOrcid = () => requestNothing('/api/v1/me/orcid', { method: 'DELETE' });

export function useSessions(fallback: SessionView[]) {
  return useSWR(
    SESSIONS,
    async (path) => (await request(path, answer('sessionsSchema'))).sessions,
    {
      fallbackData: fallback,
    },
  );
}

export const endOneSession = (id: string) =>
  requestNothing(`${SESSIONS}/${encodeURIComponent(id)}`, { method: 'DELETE' });
export const endOtherSessions = () => requestNothing(SESSIONS, { method: 'DELETE' });
