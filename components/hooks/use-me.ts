'use client';

import useSWR from 'swr';
import { z } from 'zod';
import { type SessionView, sessionSchema } from '@/lib/schemas/account';
import { meSchema } from '@/lib/schemas/people';
import { request, requestNothing } from './request';

const SESSIONS = '/api/v1/me/sessions';
const sessionsSchema = z.object({ sessions: z.array(sessionSchema) });

export function changeName(name: string) {
  return request('/api/v1/me', meSchema, { method: 'PATCH', body: { name } });
}

/** Other sessions end; this one stays. */
export function changePassword(currentPassword: string, newPassword: string) {
  return requestNothing('/api/v1/me/password', {
    method: 'POST',
    body: { currentPassword, newPassword },
  });
}

export function useSessions(fallback: SessionView[]) {
  return useSWR(SESSIONS, async (path) => (await request(path, sessionsSchema)).sessions, {
    fallbackData: fallback,
  });
}

export const endOneSession = (id: string) =>
  requestNothing(`${SESSIONS}/${encodeURIComponent(id)}`, { method: 'DELETE' });
export const endOtherSessions = () => requestNothing(SESSIONS, { method: 'DELETE' });
