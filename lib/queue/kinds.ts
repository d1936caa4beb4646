import { z } from 'zod';
import { idSchema } from '@/lib/schemas/common';

/** Every kind of job with the shape of its payload; the queue's task names are these keys. */
export const jobKinds = {
  /** Completeness maps of a survey's targets; all of them unless some are named. */
  'compute-maps': z.object({
    surveyId: idSchema,
    targetIds: z.array(idSchema).min(1).optional(),
  }),
  /** The run that names this job. */
  'compute-run': z.object({}),
  /** The study that names this job. */
  'compute-study': z.object({}),
  /** The release that names this job: its runs again, from the inputs that were frozen with them. */
  'verify-release': z.object({}),
  /** The run that names this job, brought in with a bundle: its maps first. */
  'recreate-run': z.object({}),
  /** The deposit that names this job: a published release on its way to an open repository. */
  'deposit-release': z.object({}),
  /** The export that names this job: the whole collaboration as one archive. */
  'export-collaboration': z.object({}),
} as const;

export type JobKind = keyof typeof jobKinds;
export type JobPayload<Kind extends JobKind> = z.infer<(typeof jobKinds)[Kind]>;

/** What the queue itself carries: the job's row holds everything else. */
export const deliverySchema = z.object({ jobId: idSchema });
