import { z } from 'zod';
import { type ApiRoute, route } from './api-route';
import { emailSchema } from './common';

/** What a link in a message opens. */
export const linkPurposeSchema = z.enum(['password-reset', 'sign-in']);
export type LinkPurpose = z.infer<typeof linkPurposeSchema>;

/** Asking for a link by e-mail; the answer is the same whether there is such an account. */
export const askLinkSchema = z.strictObject({ email: emailSchema, purpose: linkPurposeSchema });
export type AskLink = z.infer<typeof askLinkSchema>;

/** Length only, and the shorter of two: eight characters are enough beside a second factor. */
export const newPasswordSchema = z
  .string()
  .min(8, 'at least 8 characters')
  .max(128, 'at most 128 characters');

export const resetPasswordSchema = z.strictObject({
  code: z.string().min(1).max(100),
  password: newPasswordSchema,
});
export type ResetPassword = z.infer<typeof resetPasswordSchema>;

export const secondFactorSchema = z.object({
  /** Whether a code is asked for at sign-in. */
  isOn: z.boolean(),
  codesLeft: z.number().int(),
});
export type SecondFactorView = z.infer<typeof secondFactorSchema>;

const ownPassword = z.string().max(128);
/** Six digits, or a recovery code as somebody types it. */
const code = z.string().min(1).max(40);
export const beginFactorSchema = z.strictObject({ password: ownPassword });
export const factorCodeSchema = z.strictObject({ code });
export const removeFactorSchema = z.strictObject({ password: ownPassword, code });

/** Shown while it is set up, and never again: the key in base 32, and as an `otpauth:` address. */
export const newKeySchema = z.object({ key: z.string(), address: z.string() });
export type NewKey = z.infer<typeof newKeySchema>;
export const recoveryCodesSchema = z.object({ recoveryCodes: z.array(z.string()) });
export type RecoveryCodes = z.infer<typeof recoveryCodesSchema>;

const factor = '/api/v1/me/second-factor';

/** Ways into an account besides its password. */
export const accountRoutes: ApiRoute[] = [
  route('post', '/api/v1/account-links', 'open', 'Ask for a link by e-mail: to sign in, or reset', {
    body: askLinkSchema,
  }),
  route('delete', '/api/v1/me/orcid', 'session', 'Take the ORCID iD off your account'),
  route('get', factor, 'session', 'Whether a code is asked for when you sign in', {
    answer: secondFactorSchema,
  }),
  route('post', factor, 'session', 'A key for an authenticator; its code turns it on', {
    body: beginFactorSchema,
    answer: newKeySchema,
  }),
  route('post', `${factor}/confirm`, 'session', 'Turn the second factor on by its first code', {
    body: factorCodeSchema,
    answer: recoveryCodesSchema,
  }),
  route('post', `${factor}/recovery-codes`, 'session', 'New recovery codes, shown once', {
    body: factorCodeSchema,
    answer: recoveryCodesSchema,
  }),
  route('post', `${factor}/remove`, 'session', 'Turn the second factor off', {
    body: removeFactorSchema,
  }),
  route('post', '/api/v1/password-reset', 'open', 'Set a new password by the link; sessions end', {
    body: resetPasswordSchema,
  }),
];
