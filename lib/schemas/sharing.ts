import { z } from 'zod';
import { idSchema, lineSchema, moment } from './common';

/** Everything that a survey holds, or its maps with what a run needs beside them. */
export const shareScopeSchema = z.enum(['whole', 'maps']);
export type ShareScope = z.infer<typeof shareScopeSchema>;

const reasonSchema = lineSchema(300);

export const offerSurveySchema = z.strictObject({
  /** Sharing code of the collaboration that is to receive it, with or without hyphens. */
  code: z
    .string()
    .transform((text) => text.toLowerCase().replace(/[\s-]/g, ''))
    .pipe(z.string().regex(/^[0-9a-f]{12}$/, 'twelve digits or letters a to f')),
  scope: shareScopeSchema,
  note: z.string().trim().max(1000).default(''),
  attribution: lineSchema(500),
  expiresInDays: z.number().int().min(1).max(365).default(30),
});
export type OfferSurvey = z.infer<typeof offerSurveySchema>;

export const refuseShareSchema = z.strictObject({ why: reasonSchema });

export const withdrawShareSchema = z.strictObject({
  why: reasonSchema,
  /** The first day on which nothing new may use it, UTC; at once without one. */
  from: z.iso.date().optional(),
});
export type WithdrawShare = z.infer<typeof withdrawShareSchema>;

export const shareStateSchema = z.enum([
  'offered',
  'expired',
  'refused',
  'taken-back',
  'accepted',
  'ending',
  'withdrawn',
]);
export type ShareState = z.infer<typeof shareStateSchema>;

export const shareSchema = z.object({
  id: idSchema,
  direction: z.enum(['given', 'received']),
  /** Name of the collaboration on the other side. */
  other: z.string(),
  /** Address of the survey on this side; null for an offer that was not accepted. */
  survey: z.object({ name: z.string(), slug: z.string().nullable() }),
  scope: shareScopeSchema,
  note: z.string(),
  attribution: z.string(),
  state: shareStateSchema,
  /** What is, or was, offered; null once the source is no more. */
  holds: z.object({ targets: z.number(), maps: z.number(), curves: z.number() }).nullable(),
  offeredBy: z.string().nullable(),
  offeredAt: moment,
  expiresAt: moment,
  decidedBy: z.string().nullable(),
  decidedAt: moment.nullable(),
  decidedWhy: z.string().nullable(),
  version: z.string().nullable(),
  copiedAt: moment.nullable(),
  withdrawnFrom: moment.nullable(),
  withdrawnWhy: z.string().nullable(),
  can: z.object({ accept: z.boolean(), refresh: z.boolean(), withdraw: z.boolean() }),
});
export type ShareView = z.infer<typeof shareSchema>;

export const sharesSchema = z.object({
  /** What another collaboration needs to offer something to this one. */
  code: z.string(),
  shares: z.array(shareSchema),
});
export type Shares = z.infer<typeof sharesSchema>;

/** How a survey that another collaboration owns came here. */
export const sharedFromSchema = z.object({
  shareId: idSchema,
  owner: z.string(),
  scope: shareScopeSchema,
  attribution: z.string(),
  version: z.string(),
  copiedAt: moment,
  isWithdrawn: z.boolean(),
  withdrawnFrom: moment.nullable(),
  withdrawnWhy: z.string().nullable(),
  /** Whether the owner's survey has changed since; null where that was not looked at. */
  hasNewer: z.boolean().nullable(),
  canRefresh: z.boolean(),
});
export type SharedFrom = z.infer<typeof sharedFromSchema>;

/** A shared survey as a run that used it keeps it. */
export const sharedInputSchema = z.object({
  surveyId: idSchema,
  survey: z.string(),
  owner: z.string(),
  scope: shareScopeSchema,
  attribution: z.string(),
  version: z.string(),
});
export type SharedInput = z.infer<typeof sharedInputSchema>;

/** A shared survey that its owner took back after a run had used it. */
export const withdrawnSurveySchema = z.object({
  survey: z.string(),
  owner: z.string(),
  from: moment,
  why: z.string(),
});
export type WithdrawnSurvey = z.infer<typeof withdrawnSurveySchema>;
