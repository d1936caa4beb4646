import { z } from 'zod';
import { idSchema, levelSchema, lineSchema, positiveSchema } from './common';
import { eccentricityLawSchema } from './sensitivity';

const indexRangeSchema = z
  .strictObject({ min: z.number().min(-10).max(10), max: z.number().min(-10).max(10) })
  .refine((range) => range.min < range.max, { path: ['min'], error: 'min below max' });

/** Indices per natural logarithm, as populations are stored; uniform on the stated ranges. */
export const freeIndicesSettingsSchema = z.strictObject({
  kind: z.literal('free-indices'),
  massIndex: indexRangeSchema.default({ min: -2, max: 1 }),
  semiMajorAxisIndex: indexRangeSchema.default({ min: -2, max: 1 }),
});

export const limitMapSettingsSchema = z.strictObject({
  kind: z.literal('limit-map'),
  /** The population cut to companions at least as heavy and wide as each node, as well. */
  tailCumulative: z.boolean().default(false),
});

export const sweepParameterSchema = z.enum([
  'semi-major-axis-max',
  'semi-major-axis-min',
  'mass-min',
  'mass-max',
  'mass-index',
  'semi-major-axis-index',
  'both-indices',
]);
export const sweepSettingsSchema = z
  .strictObject({
    kind: z.literal('sweep'),
    over: sweepParameterSchema,
    /** M_Jup, au, or an index per natural logarithm. */
    from: z.number().finite(),
    to: z.number().finite(),
    count: z.number().int().min(3).max(61).default(31),
  })
  .refine((sweep) => sweep.from < sweep.to, { path: ['from'], error: 'from below to' });

/** One assumption of the baseline that is changed, the others staying as they are. */
export const systematicChangeSchema = z.discriminatedUnion('change', [
  z.strictObject({ change: z.literal('ages-young') }),
  z.strictObject({ change: z.literal('ages-old') }),
  z.strictObject({ change: z.literal('distances-near') }),
  z.strictObject({ change: z.literal('distances-far') }),
  z.strictObject({ change: z.literal('cooling'), coolingTableId: idSchema.nullable() }),
  z.strictObject({ change: z.literal('threshold') }),
  z.strictObject({ change: z.literal('n-sigma-up') }),
  z.strictObject({ change: z.literal('n-sigma-down') }),
  z.strictObject({ change: z.literal('eccentricity'), law: eccentricityLawSchema }),
  z.strictObject({
    change: z.literal('combination'),
    rule: z.enum(['same-position', 'deepest', 'independent']),
  }),
]);
export type SystematicChange = z.infer<typeof systematicChangeSchema>;
export const systematicsSettingsSchema = z.strictObject({
  kind: z.literal('systematics'),
  /** Absent: every change that the run's surveys allow. */
  changes: z.array(systematicChangeSchema).min(1).max(40).optional(),
});

export const agesCoolingSettingsSchema = z.strictObject({
  kind: z.literal('ages-cooling'),
  /** Cooling models beside the run's own, null for the built-in law; absent: up to two that fit. */
  coolingTableIds: z
    .array(idSchema.nullable())
    .max(2, 'at most two')
    .refine((ids) => new Set(ids).size === ids.length, 'each model once')
    .optional(),
});

export const overlapRulesSettingsSchema = z.strictObject({ kind: z.literal('overlap-rules') });

export const influenceSettingsSchema = z.strictObject({
  kind: z.literal('influence'),
  groupBy: z.enum(['moving-group', 'spectral-type']).default('moving-group'),
});

export const comparisonSettingsSchema = z.strictObject({
  kind: z.literal('population-comparison'),
  /** Versions of populations that are weighed against the run's own. */
  populationIds: z.array(idSchema).min(1, 'at least one population').max(8),
});

export const countsSettingsSchema = z.strictObject({
  kind: z.literal('counts'),
  /** The rate at which the number of detections is predicted exactly; absent: the median. */
  rate: positiveSchema.max(1000).optional(),
});

const plannedTargetSchema = z.strictObject({
  name: lineSchema(100),
  distancePc: positiveSchema,
  distanceErrorPc: z.number().min(0).default(0),
  ageMyr: positiveSchema.max(13_800),
  ageLowerMyr: positiveSchema.optional(),
  ageUpperMyr: positiveSchema.optional(),
  hostMag: z.number().finite(),
  hostMassMsun: positiveSchema.optional(),
});
const plannedCurveSchema = z.strictObject({
  band: lineSchema(20),
  nSigma: positiveSchema.default(5),
  separationArcsec: z.array(positiveSchema).min(2).max(500),
  contrastMag: z.array(z.number().min(0)).min(2).max(500),
});
export const plannedSurveySchema = z.discriminatedUnion('kind', [
  /** n stars drawn in turn from those of the run, their curves deeper by so many magnitudes. */
  z.strictObject({
    kind: z.literal('stars-like-these'),
    count: z.number().int().min(1).max(10_000),
    surveyIds: z.array(idSchema).max(200).optional(),
    deeperByMag: z.number().min(-5).max(10).default(0),
  }),
  z.strictObject({
    kind: z.literal('targets'),
    targets: z.array(plannedTargetSchema).min(1).max(5000),
    curve: plannedCurveSchema,
  }),
]);
export const forecastSettingsSchema = z.strictObject({
  kind: z.literal('forecast'),
  name: lineSchema(120),
  planned: plannedSurveySchema,
  /** Rate for which detections are expected; absent: the posterior of the run, with its width. */
  assumedRate: positiveSchema.max(1000).optional(),
  /** The limit that is wanted; absent: half of the run's. */
  wantedLimit: positiveSchema.max(1000).optional(),
});
export type PlannedSurvey = z.infer<typeof plannedSurveySchema>;

export const calibrationSettingsSchema = z.strictObject({
  kind: z.literal('calibration'),
  surveys: z.number().int().min(100).max(100_000).default(1000),
  levels: z.array(levelSchema).min(1).max(10).default([0.5, 0.68, 0.9, 0.95, 0.99]),
  /** Rates at which coverage is also told apart; absent: five over the prior's range. */
  truths: z.array(positiveSchema).min(1).max(20).optional(),
  /** The truth follows another population than the analysis assumes. */
  truthPopulationId: idSchema.optional(),
  /** Another stream of random numbers; absent: from the run. */
  seed: z
    .string()
    .regex(/^[0-9a-f]{1,32}$/, 'up to 32 hexadecimal digits')
    .optional(),
});

/** A further question asked of a finished run. */
export const studySettingsSchema = z.discriminatedUnion('kind', [
  freeIndicesSettingsSchema,
  limitMapSettingsSchema,
  sweepSettingsSchema,
  systematicsSettingsSchema,
  agesCoolingSettingsSchema,
  overlapRulesSettingsSchema,
  influenceSettingsSchema,
  comparisonSettingsSchema,
  countsSettingsSchema,
  forecastSettingsSchema,
  calibrationSettingsSchema,
]);
export const studyKindSchema = z.enum([
  'free-indices',
  'limit-map',
  'sweep',
  'systematics',
  'ages-cooling',
  'overlap-rules',
  'influence',
  'population-comparison',
  'counts',
  'forecast',
  'calibration',
]);
export type StudySettings = z.infer<typeof studySettingsSchema>;
export type StudyKind = StudySettings['kind'];
export type SettingsOf<Kind extends StudyKind> = Extract<StudySettings, { kind: Kind }>;
