import { z } from 'zod';
import {
  emailSchema,
  idSchema,
  lineSchema,
  moment,
  personRefSchema,
  roleSchema,
  slugSchema,
} from './common';

/** Length only: which passwords are refused for being guessable is decided by lib/access/passwords. */
export const passwordSchema = z
  .string()
  .min(15, 'at least 15 characters')
  .max(128, 'at most 128 characters');

export const signInSchema = z.strictObject({ email: emailSchema, password: z.string().max(128) });
export const signUpSchema = z.strictObject({
  name: lineSchema(100),
  email: emailSchema,
  password: passwordSchema,
});
export type SignUp = z.infer<typeof signUpSchema>;

export const createCollaborationSchema = z.strictObject({
  name: lineSchema(100),
  slug: slugSchema.min(2),
});
export const rolesSchema = z.array(roleSchema).min(1, 'at least one role').max(5);
export const inviteSchema = z.strictObject({ email: emailSchema, roles: rolesSchema });
/** Whether a member's access to the collaboration rests; what they made stays. */
export const suspensionSchema = z.strictObject({ isSuspended: z.boolean() });
export const changeRolesSchema = z.strictObject({ roles: rolesSchema });
export const scopeSchema = z.enum(['read', 'write', 'run']);
export const createTokenSchema = z.strictObject({
  name: lineSchema(100),
  scopes: z.array(scopeSchema).min(1),
  days: z.number().int().min(1).max(365).default(90),
});

export const meSchema = z.object({
  person: personRefSchema.extend({ email: z.string() }),
  collaborations: z.array(
    z.object({ slug: z.string(), name: z.string(), roles: z.array(roleSchema) }),
  ),
});
export type Me = z.infer<typeof meSchema>;

export const memberSchema = z.object({
  id: idSchema,
  person: personRefSchema.extend({ email: z.string() }),
  roles: z.array(roleSchema),
  leads: z.array(z.string()),
  joinedAt: moment,
  /** Their access rests since then. */
  suspendedAt: moment.nullable(),
  can: z.object({ changeRoles: z.boolean(), remove: z.boolean(), suspend: z.boolean() }),
});
export type MemberView = z.infer<typeof memberSchema>;

export const invitationSchema = z.object({
  id: idSchema,
  email: z.string(),
  roles: z.array(roleSchema),
  invitedBy: z.string().nullable(),
  createdAt: moment,
  expiresAt: moment,
  state: z.enum(['pending', 'expired', 'accepted', 'revoked']),
  /** Whether its newest message has gone; null for one that was sent before this was noted. */
  mail: z.enum(['waiting', 'sent', 'failed']).nullable(),
});
export type InvitationView = z.infer<typeof invitationSchema>;

/** What a person who holds an invitation's code is shown before joining. */
export const invitationOfferSchema = z.object({
  collaboration: z.string(),
  slug: z.string(),
  email: z.string(),
  roles: z.array(roleSchema),
  invitedBy: z.string().nullable(),
  hasAccount: z.boolean(),
});
export type InvitationOffer = z.infer<typeof invitationOfferSchema>;

export const tokenSchema = z.object({
  id: idSchema,
  name: z.string(),
  scopes: z.array(scopeSchema),
  ending: z.string(),
  createdAt: moment,
  expiresAt: moment,
  lastUsedAt: moment.nullable(),
  revokedAt: moment.nullable(),
});
export type TokenView = z.infer<typeof tokenSchema>;
export const newTokenSchema = tokenSchema.extend({ token: z.string() });
