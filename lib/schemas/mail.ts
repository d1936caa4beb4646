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
