'use client';

import useSWR from 'swr';
import {
  type ChangeMailPreference,
  type FailedMessage,
  failedMessagesSchema,
  mailPreferencesSchema,
  stoppedMailSchema,
} from '@/lib/schemas/mail';
import { type ChangeSettings, settingsSchema } from '@/lib/schemas/settings';
import { apiPath } from './api-path';
import { request, requestNothing } from './request';

export function changeSettings(collaboration: string, change: ChangeSettings) {
  return request(apiPath(collaboration, 'settings'), settingsSchema, {
    method: 'PATCH',
    body: change,
  });
}

export function useFailedMessages(collaboration: string, fallback: FailedMessage[]) {
  return useSWR(
    apiPath(collaboration, 'mail'),
    async (path) => (await request(path, failedMessagesSchema)).messages,
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

export function retryMessage(collaboration: string, id: string) {
  return requestNothing(apiPath(collaboration, 'mail', id, 'retry'), { method: 'POST' });
}

export function changeMailPreference(change: ChangeMailPreference) {
  return request('/api/v1/me/mail', mailPreferencesSchema, { method: 'PATCH', body: change });
}

export function stopMail(token: string) {
  return request('/api/v1/mail/stop', stoppedMailSchema, { method: 'POST', body: { token } });
}
