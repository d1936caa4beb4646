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

/** Ways into an account besides its password. */
export const accountRoutes: ApiRoute[] = [
  route('post', '/api/v1/account-links', 'open', 'Ask for a link by e-mail: to sign in, or reset', {
    body: askLinkSchema,
  }),
  route('delete', '/api/v1/me/orcid', 'session', 'Take the ORCID iD off your account'),
  route('post', '/api/v1/password-reset', 'open', 'Set a new password by the link; sessions end', {
    body: resetPasswordSchema,
  }),
];
