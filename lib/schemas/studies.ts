import { z } from 'zod';
import { idSchema, moment, pageSchema } from './common';
import { jobSchema } from './jobs';
import { studyResultSchema } from './study-results';
import { studyKindSchema, studySettingsSchema } from './study-settings';

/** What a study's numbers were made from; its digest is the study's fingerprint. */
export const studyInputsSchema = z.object({
  engineVersion: z.string(),
  seed: z.string(),
  runId: idSchema,
  runInputsDigest: z.string(),
  runResultDigest: z.string(),
  /** Digests of what the study used beyond the run: maps made anew, populations, tables. */
  further: z.array(z.object({ what: z.string(), digest: z.string() })),
});
export type StudyInputs = z.infer<typeof studyInputsSchema>;

export const createStudySchema = studySettingsSchema;

export const studyQuerySchema = pageSchema.extend({ kind: studyKindSchema.optional() });
export type StudyQuery = z.infer<typeof studyQuerySchema>;

export const studySummarySchema = z.object({
  id: idSchema,
  number: z.number(),
  settings: studySettingsSchema,
  run: z.object({
    id: idSchema,
    number: z.number(),
    analysisKey: z.string(),
    analysisName: z.string(),
  }),
  job: jobSchema,
  /** One sentence of the result, for lists; null until there is one. */
  headline: z.string().nullable(),
  createdBy: z.string().nullable(),
  createdAt: moment,
  finishedAt: moment.nullable(),
});
export type StudySummary = z.infer<typeof studySummarySchema>;

export const studySchema = studySummarySchema.extend({
  quantity: z.enum(['companions_per_star', 'host_fraction']),
  credibleLevel: z.number(),
  seed: z.string(),
  engineVersion: z.string(),
  inputs: studyInputsSchema.nullable(),
  inputsDigest: z.string().nullable(),
  result: studyResultSchema.nullable(),
  resultDigest: z.string().nullable(),
});
export type StudyView = z.infer<typeof studySchema>;
