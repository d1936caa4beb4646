import { z } from 'zod';
import { moment } from './common';
import { jobSchema } from './jobs';

const kindSchema = jobSchema.shape.kind;

/** Work of one collaboration, and the workers of the whole server as counts. */
export const workSchema = z.object({
  /** Kinds with something open. */
  queue: z.array(
    z.object({
      kind: kindSchema,
      waiting: z.number(),
      running: z.number(),
      oldestWaitingAt: moment.nullable(),
    }),
  ),
  running: z.array(
    z.object({
      job: jobSchema,
      /** Seconds until another worker may take it over, unless this one shows that it lives. */
      leaseLeftS: z.number(),
    }),
  ),
  /** The newest ones that failed, at most fifty. */
  failed: z.array(jobSchema),
  /** Of what was computed in the last 24 hours, from its start to its end. */
  durations: z.array(
    z.object({
      kind: kindSchema,
      count: z.number(),
      medianS: z.number(),
      slowestTwentiethS: z.number(),
    }),
  ),
  workers: z.object({
    processes: z.number(),
    threads: z.number(),
    engineVersions: z.array(z.string()),
    lastSeenAt: moment.nullable(),
  }),
  /** Attempts after which a job is given up. */
  maxAttempts: z.number(),
});
export type WorkView = z.infer<typeof workSchema>;
