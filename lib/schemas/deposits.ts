import { z } from 'zod';
import { moment } from './common';

/** How the copy of a release in an open repository stands. */
export const depositSchema = z.object({
  state: z.enum(['none', 'waiting', 'running', 'failed', 'published']),
  /** Host of the repository that this server knows; null where none is set up. */
  repository: z.string().nullable(),
  /** Reserved before the files are sent; it leads somewhere once the state is published. */
  doi: z.string().nullable(),
  address: z.string().nullable(),
  /** The identifier is one for trials: no resolver knows it. */
  isPractice: z.boolean(),
  askedBy: z.string().nullable(),
  askedAt: moment.nullable(),
  publishedAt: moment.nullable(),
  stage: z.string(),
  done: z.number(),
  total: z.number(),
  fault: z.string().nullable(),
  canAsk: z.boolean(),
  whyNot: z.string().nullable(),
});
export type DepositView = z.infer<typeof depositSchema>;
