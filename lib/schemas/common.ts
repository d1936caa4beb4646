import { z } from 'zod';

export const roleSchema = z.enum(['owner', 'statistician', 'collaborator', 'author', 'student']);
export type Role = z.infer<typeof roleSchema>;

export const idSchema = z.uuid();
export const slugSchema = z
  .string()
  .regex(/^[a-z0-9][a-z0-9-]{0,38}$/, 'lower-case letters, digits and hyphens, at most 39');

/** One line of text without control or direction characters, trimmed. */
export const lineSchema = (longest: number) =>
  z
    .string()
    .trim()
    .min(1, 'something to read')
    .max(longest, `at most ${longest} characters`)
    .regex(/^[^\p{Cc}\u202a-\u202e\u2066-\u2069]*$/u, 'no control or direction characters');

export const emailSchema = z
  .string()
  .max(254)
  .regex(/^[^\p{Cc}\s"<>]*$/u, 'an address without line breaks, quotes or spaces')
  .refine((text) => text.normalize('NFKC').split('@').length === 2, 'exactly one @')
  .pipe(z.email('an e-mail address'))
  .transform((text) => text.toLowerCase());

export const positiveSchema = z.number().finite().positive();
export const levelSchema = z
  .number()
  .gt(0, 'more than 0 and less than 1')
  .lt(1, 'more than 0 and less than 1; is this per cent?');

/** From the Link header of the page before; its inside is nobody's business. */
export const cursorSchema = z
  .string()
  .max(100)
  .regex(/^[A-Za-z0-9_-]+$/, 'the cursor of a Link header');

/** Lists are read page by page: at most 500 rows, from an offset or a cursor. */
export const pageSchema = z.strictObject({
  limit: z.coerce.number().int().min(1).max(500).default(100),
  offset: z.coerce.number().int().min(0).default(0),
  cursor: cursorSchema.optional(),
});

export const moment = z.iso.datetime({ offset: true });
export const personRefSchema = z.object({ id: idSchema, name: z.string() });
export type PersonRef = z.infer<typeof personRefSchema>;

/** What a rate counts: stars with a planet, or planets. */
export const rateQuantitySchema = z.enum(['companions_per_star', 'host_fraction']);
