import { z } from 'zod';
import { ratePriorSchema } from './analyses';
import { idSchema, rateQuantitySchema } from './common';

const fraction = z.number().min(0).max(1);
const pair = z.tuple([z.number(), z.number()]);
const indexSchema = z
  .strictObject({ linear: z.number(), perLogarithm: z.number() })
  .nullable()
  .describe('dN/dx ∝ x^linear and dN/d ln x ∝ x^perLogarithm: perLogarithm is linear plus one');

/** A limit with everything that it rests on: levels, shares and rates are fractions, never per cent. */
export const limitStatementSchema = z.strictObject({
  format: z.literal('rarebound/limit-statement'),
  version: z.literal(1),
  state: z.enum(['recorded', 'live']).describe('live: it follows a control and no run records it'),
  sentence: z.string(),
  conditions: z.array(z.strictObject({ label: z.string(), text: z.string() })),
  quantity: rateQuantitySchema,
  upperLimit: z
    .number()
    .nullable()
    .describe('fraction of stars, or planets per star; null: the data constrain nothing'),
  credibleLevel: fraction,
  interval: z
    .strictObject({ kind: z.string(), level: fraction, low: z.number(), high: z.number() })
    .nullable(),
  isSetByPrior: z.boolean(),
  prior: ratePriorSchema,
  priorInWords: z.string(),
  population: z.strictObject({
    key: z.string().nullable(),
    version: z.number().nullable(),
    digest: z.string().nullable(),
    inWords: z.string(),
    massIndex: indexSchema,
    semiMajorAxisIndex: indexSchema,
  }),
  ranges: z.strictObject({ massMjup: pair.nullable(), semiMajorAxisAu: pair }),
  counts: z.strictObject({
    stars: z.number(),
    entries: z.number(),
    detections: z.number(),
    countingRule: z.string(),
  }),
  exposureStars: z.number(),
  expectedFalseDetections: z.number().nullable(),
  shareOutside: fraction,
  combinationRule: z.string(),
  cooling: z.string(),
  eccentricity: z.string(),
  threshold: z.string(),
  surveys: z.array(z.string()),
  run: z
    .strictObject({
      id: idSchema,
      analysis: z.string(),
      number: z.number(),
      engineVersion: z.string(),
      resultDigest: z.string().nullable(),
      population: z.strictObject({ key: z.string(), version: z.number(), digest: z.string() }),
    })
    .nullable(),
});
export type LimitStatement = z.infer<typeof limitStatementSchema>;

export const statementQuerySchema = z.strictObject({
  /** A fraction, one of those that the run recorded; the run's own when absent. */
  level: z.coerce.number().gt(0).lt(1).optional(),
  quantity: rateQuantitySchema.optional(),
  detections: z.enum(['counted', 'none']).optional(),
  /** What comes back; without it the Accept header decides, and JSON where that leaves it open. */
  as: z.enum(['text', 'json', 'latex']).optional(),
});
export type StatementQuery = z.infer<typeof statementQuerySchema>;
