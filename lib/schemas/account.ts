import { z } from 'zod';
import { newPasswordSchema } from './account-access';
import { idSchema, lineSchema, moment } from './common';
import { passwordSchema } from './people';

/** What a person may change of their own; the address is fixed, roles are given by owners. */
export const updateMeSchema = z.strictObject({ name: lineSchema(100) });
export const changePasswordSchema = z.strictObject({
  currentPassword: z.string().max(128),
  newPassword: newPasswordSchema,
});
export type ChangePassword = z.infer<typeof changePasswordSchema>;

/** Accepting an invitation: a new person gives name and password, a signed-in one nothing. */
export const joinSchema = z.strictObject({
  name: lineSchema(100).optional(),
  password: passwordSchema.optional(),
});
export type Join = z.infer<typeof joinSchema>;
export const joinedSchema = z.object({
  slug: z.string(),
  email: z.string(),
  /** A new account signs in next; a signed-in person goes straight to the collaboration. */
  isNewAccount: z.boolean(),
});
export type Joined = z.infer<typeof joinedSchema>;

export const collaborationSchema = z.object({
  slug: z.string(),
  name: z.string(),
  createdAt: moment,
  can: z.object({ manage: z.boolean(), invite: z.boolean(), readAudit: z.boolean() }),
});
export type CollaborationView = z.infer<typeof collaborationSchema>;
export const updateCollaborationSchema = z.strictObject({ name: lineSchema(100) });

/** One sign-in of the person: where from, and whether it is the one that asks. */
export const sessionSchema = z.object({
  id: idSchema,
  userAgent: z.string().nullable(),
  createdAt: moment,
  lastSeenAt: moment,
  expiresAt: moment,
  isThisOne: z.boolean(),
});
export type SessionView = z.infer<typeof sessionSchema>;
