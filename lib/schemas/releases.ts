import { z } from 'zod';
import { idSchema, lineSchema, moment, rateQuantitySchema } from './common';
import { jobStatusSchema } from './jobs';
import { licences } from './licences';
import { orcidSchema } from './orcid';

export { licences } from './licences';

/** Several lines of plain text. */
const textSchema = (longest: number) =>
  z
    .string()
    .trim()
    .max(longest, `at most ${longest} characters`)
    .regex(/^(?:[^\p{Cc}\u202a-\u202e\u2066-\u2069]|[\n\t])*$/u, 'no control characters');

export const licenceSchema = z.enum(
  Object.keys(licences) as [keyof typeof licences, ...(keyof typeof licences)[]],
);
export type Licence = z.infer<typeof licenceSchema>;

export const authorSchema = z.strictObject({
  name: lineSchema(100),
  affiliation: lineSchema(200).optional(),
  orcid: orcidSchema.optional(),
});
export type Author = z.infer<typeof authorSchema>;

/** One condition of freezing: met, or what is to be said about it. */
export const freezeCheckSchema = z.object({
  name: z.enum(['inputs', 'maps', 'calibration', 'candidates']),
  isMet: z.boolean(),
  /** Not met: a reason is asked for; `stops` means that no reason is enough. */
  stops: z.boolean(),
  words: z.string(),
});
export type FreezeCheck = z.infer<typeof freezeCheckSchema>;

export const freezeRunSchema = z.strictObject({ reason: textSchema(1000).optional() });

export const freezeStandingSchema = z.object({
  run: z.object({ id: idSchema, number: z.number(), analysisKey: z.string() }),
  checks: z.array(freezeCheckSchema),
  frozen: z
    .object({ by: z.string(), at: moment, reason: z.string().nullable(), sha256: z.string() })
    .nullable(),
  canFreeze: z.boolean(),
  canLink: z.boolean(),
});
export type FreezeStanding = z.infer<typeof freezeStandingSchema>;

const releaseFields = {
  title: lineSchema(200),
  authors: z.array(authorSchema).min(1, 'at least one author').max(200),
  abstract: textSchema(5000).default(''),
  licence: licenceSchema.default('CC-BY-4.0'),
  note: textSchema(5000).default(''),
  runIds: z.array(idSchema).min(1, 'at least one frozen run').max(20),
  /** A published release that this one takes the place of. */
  replacesId: idSchema.nullable().default(null),
};
export const createReleaseSchema = z.strictObject(releaseFields);
export type CreateRelease = z.infer<typeof createReleaseSchema>;
export const updateReleaseSchema = z.strictObject(releaseFields).partial();

export const withdrawReleaseSchema = z.strictObject({
  reason: textSchema(1000).min(1, 'a reason for whoever comes to the page'),
});

/** What running again from the frozen inputs gave, run by run. */
export const releaseCheckSchema = z.object({
  isSame: z.boolean(),
  digits: z.number(),
  runs: z.array(
    z.object({
      runId: idSchema,
      name: z.string(),
      isSame: z.boolean(),
      isSameDigest: z.boolean(),
      limit: z.number(),
      /** Where the numbers part, the first few: "answer.limit: 0.0581 stored, 0.0585 again". */
      differences: z.array(z.string()),
      differenceCount: z.number(),
      /** Why it differs and what helps, where that is known. */
      cause: z.string().nullable().optional(),
    }),
  ),
  engineVersion: z.string(),
  checkedAt: moment,
});
export type ReleaseCheck = z.infer<typeof releaseCheckSchema>;

export const releaseStateSchema = z.enum([
  'draft',
  'checking',
  'mismatch',
  'failed',
  'checked',
  'published',
  'withdrawn',
]);
export type ReleaseState = z.infer<typeof releaseStateSchema>;

const signedSchema = z.object({ by: z.string(), at: moment }).nullable();

export const releaseRunSchema = z.object({
  id: idSchema,
  number: z.number(),
  analysisKey: z.string(),
  analysisName: z.string(),
  sentence: z.string(),
  /** What the limit rests on, in words: the ranges, the prior, and what counted. */
  ranges: z.string(),
  prior: z.string(),
  detections: z.string(),
  limit: z.number(),
  credibleLevel: z.number(),
  quantity: rateQuantitySchema,
  frozenBy: z.string(),
  frozenAt: moment,
  inputsDigest: z.string(),
  resultDigest: z.string(),
});
export type ReleaseRunView = z.infer<typeof releaseRunSchema>;

export const releaseFileSchema = z.object({
  name: z.string(),
  mediaType: z.string(),
  description: z.string(),
  byteLength: z.number(),
  sha256: z.string(),
});

export const releaseSchema = z.object({
  id: idSchema,
  key: z.string(),
  code: z.string(),
  state: releaseStateSchema,
  title: z.string(),
  authors: z.array(
    z.object({
      name: z.string(),
      affiliation: z.string().optional(),
      orcid: z.string().optional(),
    }),
  ),
  abstract: z.string(),
  licence: licenceSchema,
  note: z.string(),
  runs: z.array(releaseRunSchema),
  replaces: z.object({ id: idSchema, key: z.string(), code: z.string() }).nullable(),
  replacedBy: z.object({ id: idSchema, key: z.string(), code: z.string() }).nullable(),
  createdBy: z.string().nullable(),
  createdAt: moment,
  signedOff: signedSchema,
  agreed: signedSchema,
  published: signedSchema,
  withdrawn: z.object({ by: z.string(), at: moment, reason: z.string() }).nullable(),
  job: z.object({ id: idSchema, status: jobStatusSchema, fault: z.string().nullable() }).nullable(),
  verification: releaseCheckSchema.nullable(),
  files: z.array(releaseFileSchema),
  /** The next steps that the person may take, and why not those that they may not. */
  can: z.object({
    change: z.boolean(),
    signOff: z.boolean(),
    agree: z.boolean(),
    publish: z.boolean(),
    withdraw: z.boolean(),
    link: z.boolean(),
    whyNotAgree: z.string().nullable(),
    whyNotSignOff: z.string().nullable(),
  }),
});
export type ReleaseView = z.infer<typeof releaseSchema>;

export const createGuestLinkSchema = z
  .strictObject({
    label: lineSchema(100),
    days: z.number().int().min(1).max(365).default(60),
    releaseId: idSchema.optional(),
    runId: idSchema.optional(),
  })
  .refine(({ releaseId, runId }) => (releaseId === undefined) !== (runId === undefined), {
    message: 'a release or a frozen run, one of the two',
    path: ['releaseId'],
  });

export const guestNoteSchema = z.object({
  id: idSchema,
  name: z.string(),
  body: z.string(),
  createdAt: moment,
});
export const guestLinkSchema = z.object({
  id: idSchema,
  label: z.string(),
  opens: z.string(),
  ending: z.string(),
  expiresAt: moment,
  revokedAt: moment.nullable(),
  lastUsedAt: moment.nullable(),
  isOpen: z.boolean(),
  createdBy: z.string().nullable(),
  createdAt: moment,
  notes: z.array(guestNoteSchema),
});
export type GuestLinkView = z.infer<typeof guestLinkSchema>;
/** The address is shown once: only its hash is kept. */
export const newGuestLinkSchema = z.object({ link: guestLinkSchema, address: z.string() });
export const writeGuestNoteSchema = z.strictObject({
  name: lineSchema(100),
  body: textSchema(10_000).min(1, 'something to read'),
});

export const releaseAddressSchema = z.object({ address: z.string() });
