'use client';

import useSWR from 'swr';
import type { ChangeMailPreference, FailedMessage } from '@/lib/schemas/mail';
import type { ChangeSettings, SettingsView } from '@/lib/schemas/settings';
import { answer } from './answer';
import { apiPath } from './api-path';
import { change, pick } from './change';
import { request, requestNothing } from './request';

export type SettingsPart = Partial<SettingsView>;

/** Changes settings where those parts that were opened are as they were. */
export function changeSettings(
  collaboration: string,
  opened: SettingsPart,
  body: ChangeSettings,
): Promise<SettingsView> {
  return change(apiPath(collaboration, 'settings'), answer('settingsSchema'), {
    part: (settings): SettingsPart => pick(settings, opened as SettingsView),
    opened,
    body,
    answer: answer('settingsSchema'),
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

export function changeMailPreference(wanted: ChangeMailPreference) {
  return change('/api/v1/me/mail', answer('mailPreferencesSchema'), {
    part: ({ preferences }) =>
      preferences.find(({ kind }) => kind === wanted.kind)?.isWanted ?? !wanted.isWanted,
    opened: !wanted.isWanted,
    body: wanted,
    answer: answer('mailPreferencesSchema'),
  });
}

export function stopMail(token: string) {
  return request('/api/v1/mail/stop', answer('stoppedMailSchema'), {
    method: 'POST',
    body: { token },
  });
}
