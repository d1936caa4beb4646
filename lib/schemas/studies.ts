import { z } from 'zod';
import { idSchema, moment, pageSchema, rateQuantitySchema } from './common';
import { jobSchema } from './jobs';
import { AGE_SHIFTS, COOLING_AS_RUN } from './stack-choices';
import { type ResultOf, studyResultSchema } from './study-results';
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

/** Which maps of an answer about ages and cooling. */
export const studyMapsQuerySchema = z.strictObject({
  /** `as-run`, `built-in` or the id of a cooling table. */
  cooling: z.string().max(100).default(COOLING_AS_RUN),
  /** One of the stored shifts of age. */
  age: z.coerce
    .number()
    .refine((shift) => AGE_SHIFTS.includes(shift), `one of ${AGE_SHIFTS.join(', ')}`)
    .default(0),
});
export type StudyMapsQuery = z.infer<typeof studyMapsQuerySchema>;

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
  can: z.object({ remove: z.boolean() }),
});
export type StudySummary = z.infer<typeof studySummarySchema>;

export const studySchema = studySummarySchema.extend({
  quantity: rateQuantitySchema,
  credibleLevel: z.number(),
  seed: z.string(),
  engineVersion: z.string(),
  inputs: studyInputsSchema.nullable(),
  inputsDigest: z.string().nullable(),
  result: studyResultSchema.nullable(),
  resultDigest: z.string().nullable(),
});
export type StudyView = z.infer<typeof studySchema>;

/** A run's answer about ages and cooling, as its page needs it to move between the kept maps. */
export interface AgesCoolingAnswer {
  id: string;
  result: ResultOf<'ages-cooling'>;
}
