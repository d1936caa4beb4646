import { z } from 'zod';
import { idSchema, lineSchema, moment, rateQuantitySchema } from './common';
import { changeableParts } from './exercise-parts';

export { type ChangeablePart, changeableParts, partNames } from './exercise-parts';

export const changeablePartSchema = z.enum(changeableParts);

const text = (longest: number) => z.string().trim().max(longest, `at most ${longest} characters`);
const taskSchema = text(4000).min(1, 'something to read');
const partsSchema = z
  .array(changeablePartSchema)
  .min(1, 'at least one part')
  .max(changeableParts.length)
  .refine((parts) => new Set(parts).size === parts.length, 'each part once');

export const createExerciseSchema = z.strictObject({
  title: lineSchema(120),
  task: taskSchema,
  /** A finished run: what submissions are held against. */
  runId: idSchema,
  mayChange: partsSchema,
  /** Its last day, UTC; null: no end. */
  dueOn: z.iso.date().nullable().default(null),
  /** Seen by everybody in the collaboration. */
  isShared: z.boolean().default(true),
});
export type CreateExercise = z.input<typeof createExerciseSchema>;

export const updateExerciseSchema = z.strictObject({
  title: lineSchema(120).optional(),
  task: taskSchema.optional(),
  mayChange: partsSchema.optional(),
  dueOn: z.iso.date().nullable().optional(),
  isShared: z.boolean().optional(),
});
export type UpdateExercise = z.infer<typeof updateExerciseSchema>;

export const submitExerciseSchema = z.strictObject({
  /** A finished run of the draft that the exercise was begun with. */
  runId: idSchema,
  remark: text(2000).default(''),
});
export const commentSubmissionSchema = z.strictObject({ comment: taskSchema });

const limitSchema = z.object({
  sentence: z.string(),
  conditions: z.array(z.string()),
  quantity: rateQuantitySchema,
  credibleLevel: z.number(),
  limit: z.number(),
  isConstrained: z.boolean(),
});
export type StatedLimit = z.infer<typeof limitSchema>;

const runRefSchema = z.object({ id: idSchema, number: z.number(), analysis: z.string() });

export const exerciseSchema = z.object({
  id: idSchema,
  key: z.string(),
  number: z.number(),
  title: z.string(),
  task: z.string(),
  mayChange: z.array(changeablePartSchema),
  dueOn: z.iso.date().nullable(),
  /** Its last day is not over. */
  isOpen: z.boolean(),
  isShared: z.boolean(),
  createdBy: z.string().nullable(),
  createdAt: moment,
  reference: z.object({ run: runRefSchema, name: z.string(), stated: limitSchema }),
  /** People who began it, and runs handed in; null for whoever may not see everybody's. */
  counts: z.object({ started: z.number(), submissions: z.number() }).nullable(),
  /** What the reader did with it. */
  own: z.object({ analysis: z.string(), startedAt: moment, submissions: z.number() }).nullable(),
  can: z.object({ change: z.boolean(), begin: z.boolean(), submit: z.boolean() }),
});
export type ExerciseView = z.infer<typeof exerciseSchema>;

export const submissionSchema = z.object({
  id: idSchema,
  number: z.number(),
  run: runRefSchema,
  remark: z.string(),
  submittedAt: moment,
  /** What its recipe changed against the reference, in words. */
  differences: z.array(z.string()),
  stated: limitSchema,
  /** '−3.0 points', or why the two limits are not compared. */
  difference: z.string(),
  comment: z.string().nullable(),
  commentedBy: z.string().nullable(),
  commentedAt: moment.nullable(),
});
export type SubmissionView = z.infer<typeof submissionSchema>;

export const participantSchema = z.object({
  person: z.object({ id: idSchema, name: z.string() }),
  state: z.enum(['not-begun', 'begun', 'handed-in']),
  analysis: z.string().nullable(),
  startedAt: moment.nullable(),
  /** The newest first. */
  submissions: z.array(submissionSchema),
});
export type ParticipantView = z.infer<typeof participantSchema>;

export const exerciseDetailSchema = exerciseSchema.extend({
  /** Everybody for whoever set it; else the reader alone. */
  participants: z.array(participantSchema),
  /** Finished runs of the reader's draft that were not handed in yet, the newest first. */
  ready: z.array(runRefSchema.extend({ sentence: z.string() })),
});
export type ExerciseDetail = z.infer<typeof exerciseDetailSchema>;
