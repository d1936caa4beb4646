import { z } from 'zod';
import { analysisSchema } from './analyses';
import { moment } from './common';
import { jobSchema } from './jobs';
import { surveyListSchema } from './surveys';

/** Where a collaboration stands, what waits for a person. */
export const overviewSchema = z.object({
  name: z.string(),
  slug: z.string(),
  people: z.number(),
  surveys: surveyListSchema,
  lead: z.string().nullable(),
  analyses: z.array(analysisSchema),
  /** Finished runs of the lead analysis, oldest first: how its limit has moved. */
  history: z.array(
    z.object({
      at: moment,
      run: z.number(),
      limit: z.number(),
      zeroLimit: z.number(),
      label: z.string(),
    }),
  ),
  waiting: z.array(
    z.object({ fact: z.string(), detail: z.string(), verb: z.string(), address: z.string() }),
  ),
  jobs: z.array(jobSchema),
  log: z.array(z.object({ at: moment, who: z.string(), what: z.string() })),
  can: z.object({ invite: z.boolean(), addSurvey: z.boolean(), addAnalysis: z.boolean() }),
});
export type Overview = z.infer<typeof overviewSchema>;
