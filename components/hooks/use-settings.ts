'use client';

import useSWR from 'swr';
import type { ChangeMailPreference, FailedMessage } from '@/lib/schemas/mail';
import type { ChangeSettings } from '@/lib/schemas/settings';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request, requestNothing } from './request';

export function changeSettings(collaboration: string, change: ChangeSettings) {
  return request(apiPath(collaboration, 'settings'), answer('settingsSchema'), {
    method: 'PATCH',
    body: change,
  });
}

export function useFailedMessages(collaboration: string, fallback: FailedMessage[]) {
  return useSWR(
    apiPath(collaboration, 'mail'),
    async (path) => (await request(path, answer('failedMessagesSchema'))).messages,
    { fallbackData: fallback, revalidateOnFocus: false },
  );
}

export function retryMessage(collaboration: string, id: string) {
  return requestNothing(apiPath(collaboration, 'mail', id, 'retry'), { method: 'POST' });
}

export function changeMailPreference(change: ChangeMailPreference) {
  return request('/api/v1/me/mail', answer('mailPreferencesSchema'), {
    method: 'PATCH',
    body: change,
  });
}

export function stopMail(token: string) {
  return request('/api/v1/mail/stop', answer('stoppedMailSchema'), {
    method: 'POST',
    body: { token },
  });
}
