import { z } from 'zod';
import { idSchema, moment } from './common';

/** Kinds of mail that a person may stop. */
export const mailPreferenceSchema = z.enum([
  'mention',
  'notes',
  'run',
  'sign-off',
  'release',
  'guest-link',
]);
export type MailPreference = z.infer<typeof mailPreferenceSchema>;

/** What each kind brings, as the page of preferences says it. */
export const mailPreferenceWords: Record<MailPreference, { label: string; hint: string }> = {
  mention: { label: 'Mentions', hint: 'somebody names you in a note' },
  notes: { label: 'Notes on what is yours', hint: 'at most one message an hour' },
  run: { label: 'Runs', hint: 'one that you started and that took over a minute has ended' },
  'sign-off': { label: 'Freezing and agreement', hint: 'asked of you, or given to you' },
  release: { label: 'Releases', hint: 'published or withdrawn' },
  'guest-link': { label: 'Guest links', hint: 'one that you gave ends in three days' },
};

export const mailPreferencesSchema = z.object({
  preferences: z.array(z.object({ kind: mailPreferenceSchema, isWanted: z.boolean() })),
});
export type MailPreferences = z.infer<typeof mailPreferencesSchema>;
export const changeMailPreferenceSchema = z.strictObject({
  kind: mailPreferenceSchema,
  isWanted: z.boolean(),
});
export type ChangeMailPreference = z.infer<typeof changeMailPreferenceSchema>;

export const stopMailSchema = z.strictObject({ token: z.string().min(1).max(400) });
export const stoppedMailSchema = z.object({ kind: mailPreferenceSchema });
export type StoppedMail = z.infer<typeof stoppedMailSchema>;

/** A message of the collaboration that could not be delivered. */
export const failedMessageSchema = z.object({
  id: idSchema,
  kind: z.string(),
  to: z.string(),
  fault: z.string(),
  attempts: z.number(),
  createdAt: moment,
  endedAt: moment,
});
export type FailedMessage = z.infer<typeof failedMessageSchema>;
export const failedMessagesSchema = z.object({ messages: z.array(failedMessageSchema) });
