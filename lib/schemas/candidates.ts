import { z } from 'zod';
import { idSchema, lineSchema, moment, pageSchema, positiveSchema } from './common';

export const companionStatusSchema = z.enum(['confirmed', 'candidate', 'ambiguous', 'background']);
export type CompanionStatus = z.infer<typeof companionStatusSchema>;

const notNegative = z.number().finite().min(0, '0 or more');
const daySchema = z.iso
  .date('a day as 2014-05-01')
  .refine((day) => day >= '1950-01-01' && day < '2050-01-01', 'a day of 1950 to 2049');

/** One place of a candidate beside its star, on one day. */
export const addObservationSchema = z.strictObject({
  observedOn: daySchema,
  separationArcsec: positiveSchema.max(3600),
  separationErrorArcsec: positiveSchema.max(3600),
  /** From north through east. */
  positionAngleDeg: z.number().min(0).lt(360, '0 or more and less than 360'),
  positionAngleErrorDeg: positiveSchema.max(180),
  band: lineSchema(20).nullable().default(null),
  /** How much fainter than the star. */
  contrastMag: notNegative.max(100).nullable().default(null),
  contrastErrorMag: notNegative.max(100).nullable().default(null),
  /** Where it comes from: an instrument, a reduction, a paper. */
  source: lineSchema(300).nullable().default(null),
});
export type AddObservation = z.infer<typeof addObservationSchema>;

const givenValue = z.strictObject({
  from: z.literal('given'),
  value: positiveSchema,
  errorLower: notNegative,
  errorUpper: notNegative,
});
const keptValue = z.strictObject({ from: z.literal('kept') });

export const giveVerdictSchema = z.strictObject({
  status: companionStatusSchema,
  /** That it is a companion; 1 where confirmed and 0 for background. */
  probability: z.number().min(0).max(1).nullable().default(null),
  /** [M_Jup]; `photometry` takes what the server reads from the newest contrast. */
  mass: z
    .discriminatedUnion('from', [
      keptValue,
      givenValue,
      z.strictObject({ from: z.literal('photometry') }),
    ])
    .default({ from: 'kept' }),
  /** [AU]; `separation` takes what follows from the newest separation and the distance. */
  semiMajorAxis: z
    .discriminatedUnion('from', [
      keptValue,
      givenValue,
      z.strictObject({ from: z.literal('separation') }),
    ])
    .default({ from: 'kept' }),
  reason: z
    .string()
    .trim()
    .min(1, 'a reason: what the verdict rests on')
    .max(2000, 'at most 2000 characters'),
  /** A proposal stands in the history and changes nothing. */
  isProposal: z.boolean().default(false),
});
export type GiveVerdict = z.infer<typeof giveVerdictSchema>;

export const candidateQuerySchema = pageSchema.extend({
  status: companionStatusSchema.optional(),
  survey: z.string().optional(),
});
export type CandidateQuery = z.infer<typeof candidateQuerySchema>;

const errors = z.tuple([z.number(), z.number()]).nullable();

const statedSchema = z.object({
  status: companionStatusSchema,
  probability: z.number().nullable(),
  massMjup: z.number().nullable(),
  massErrorsMjup: errors,
  semiMajorAxisAu: z.number().nullable(),
  semiMajorAxisErrorsAu: errors,
});

export const candidateSchema = statedSchema.extend({
  id: idSchema,
  name: z.string(),
  star: z.string(),
  survey: z.object({ slug: z.string(), name: z.string(), position: z.number() }),
  observations: z.number(),
  /** Inside the ranges of the lead analysis; null where mass, axis or a lead analysis is missing. */
  isInsideRanges: z.boolean().nullable(),
  /** Nobody has decided: a candidate, or ambiguous. */
  isOpen: z.boolean(),
  proposals: z.number(),
});
export type CandidateView = z.infer<typeof candidateSchema>;

export const candidateListSchema = z.object({
  candidates: z.array(candidateSchema),
  total: z.number(),
  /** By status, whatever the filter. */
  counts: z.record(companionStatusSchema, z.number()),
  /** The analysis whose ranges `isInsideRanges` tells of. */
  lead: z.string().nullable(),
});
export type CandidateList = z.infer<typeof candidateListSchema>;

export const observationSchema = z.object({
  id: idSchema,
  /** The other survey that brought it, for the same companion of the same star. */
  survey: z.string().optional(),
  observedOn: z.string(),
  julianYear: z.number(),
  separationArcsec: z.number(),
  separationErrorArcsec: z.number().nullable(),
  positionAngleDeg: z.number(),
  positionAngleErrorDeg: z.number().nullable(),
  band: z.string().nullable(),
  contrastMag: z.number().nullable(),
  contrastErrorMag: z.number().nullable(),
  source: z.string().nullable(),
  isFromFile: z.boolean(),
  /** Who added it, or brought the file. */
  by: z.string().nullable(),
});
export type ObservationView = z.infer<typeof observationSchema>;

const fitSchema = z.object({
  chiSquared: z.number(),
  degreesOfFreedom: z.number(),
  /** Of a chi-squared at least as large, where the hypothesis holds. */
  probability: z.number(),
  /** Per tested epoch, in order of time: distance from the prediction; 0 for the reference. */
  sigmas: z.array(z.number()),
});
export type FitView = z.infer<typeof fitSchema>;

const estimateSchema = z.object({ median: z.number(), lower: z.number(), upper: z.number() });

export const massEstimateSchema = z.object({
  observedOn: z.string(),
  band: z.string(),
  absoluteMag: z.number(),
  errorMag: z.number(),
  ageMyr: z.number(),
  cooling: z.string(),
  /** At the median age; more than one where brightness does not rise with mass. */
  solutionsMjup: z.array(z.number()),
  interval: estimateSchema.nullable(),
  outside: z.enum(['brighter', 'fainter']).nullable(),
  touchesEdge: z.boolean(),
});
export type MassEstimate = z.infer<typeof massEstimateSchema>;

export const axisEstimateSchema = estimateSchema.extend({
  observedOn: z.string(),
  projectedSeparationAu: z.number(),
});
export type AxisEstimate = z.infer<typeof axisEstimateSchema>;

export const verdictSchema = statedSchema.extend({
  number: z.number(),
  isProposal: z.boolean(),
  massFrom: z.string().nullable(),
  semiMajorAxisFrom: z.string().nullable(),
  reason: z.string(),
  /** Name of the file that states it. */
  file: z.string().nullable(),
  by: z.string().nullable(),
  at: moment,
});
export type VerdictView = z.infer<typeof verdictSchema>;

export const candidateDetailSchema = candidateSchema.extend({
  target: z.object({
    id: idSchema,
    starId: idSchema.optional(),
    distancePc: z.number().nullable(),
    ageMyr: z.number().nullable(),
    /** Where age and distance are those adopted for the star: what the estimates rest on. */
    adopted: z.array(z.string()).optional(),
  }),
  reference: z.string().nullable(),
  /** In order of time. */
  history: z.array(verdictSchema),
  seen: z.array(observationSchema),
  /** What moves the star; null with `motionMissing` saying what is not known. */
  motion: z
    .object({
      raDeg: z.number(),
      decDeg: z.number(),
      pmRaMasYr: z.number(),
      pmDecMasYr: z.number(),
      parallaxMas: z.number(),
      parallaxErrorMas: z.number(),
    })
    .nullable(),
  motionMissing: z.string().nullable(),
  /** Null where there are fewer than two epochs with errors, or the star's motion is not known. */
  hypotheses: z
    .object({
      /** Ids of the tested observations, in order of time. */
      observationIds: z.array(idSchema),
      commonProperMotion: fitSchema,
      background: fitSchema,
    })
    .nullable(),
  mass: massEstimateSchema.nullable(),
  massMissing: z.string().nullable(),
  axis: axisEstimateSchema.nullable(),
  axisMissing: z.string().nullable(),
  can: z.object({ vet: z.boolean(), propose: z.boolean() }),
});
export type CandidateDetail = z.infer<typeof candidateDetailSchema>;
