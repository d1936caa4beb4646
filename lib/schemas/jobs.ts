import { z } from 'zod';
import { idSchema, moment } from './common';

export const jobStatusSchema = z.enum(['waiting', 'running', 'done', 'failed', 'cancelled']);
export const jobSchema = z.object({
  id: idSchema,
  kind: z.enum([
    'compute-maps',
    'compute-run',
    'compute-study',
    'verify-release',
    'recreate-run',
    'deposit-release',
    'export-collaboration',
  ]),
  status: jobStatusSchema,
  stage: z.string(),
  done: z.number(),
  total: z.number(),
  attempts: z.number(),
  /** Seconds, from the pace so far; null before there is a pace. */
  timeLeftS: z.number().nullable(),
  cancelRequested: z.boolean(),
  fault: z.string().nullable(),
  /** What it works on, for a sentence: a survey's name or an analysis's key. */
  subject: z.string(),
  /** The page that shows what it makes, below the collaboration's own; null where that is gone. */
  page: z.string().nullable(),
  createdAt: moment,
  startedAt: moment.nullable(),
  finishedAt: moment.nullable(),
});
export type JobView = z.infer<typeof jobSchema>;
