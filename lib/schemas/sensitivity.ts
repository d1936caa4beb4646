import { z } from 'zod';
import { idSchema, positiveSchema } from './common';

export const eccentricityLawSchema = z.discriminatedUnion('law', [
  z.strictObject({ law: z.literal('circular') }),
  z.strictObject({ law: z.literal('fixed'), eccentricity: z.number().min(0).lt(1) }),
  z.strictObject({ law: z.literal('uniform'), max: z.number().gt(0).lt(1) }),
  z.strictObject({ law: z.literal('beta'), alpha: positiveSchema, beta: positiveSchema }),
  z.strictObject({ law: z.literal('rayleigh'), sigma: positiveSchema }),
]);

export const axisRangeSchema = z
  .strictObject({
    min: positiveSchema,
    max: positiveSchema,
    count: z.number().int().min(2).max(512),
  })
  .refine((axis) => axis.min < axis.max, 'min below max');

/** How a survey's contrast curves become completeness maps. Part of each map's digest. */
export const mapSettingsSchema = z.strictObject({
  eccentricity: eccentricityLawSchema.default({ law: 'uniform', max: 0.95 }),
  threshold: z.enum(['hard', 'smooth']).default('smooth'),
  cooling: z
    .discriminatedUnion('kind', [
      z.strictObject({ kind: z.literal('built-in') }),
      z.strictObject({ kind: z.literal('table'), coolingTableId: idSchema }),
    ])
    .default({ kind: 'built-in' }),
  massOutsideTable: z.enum(['undetectable', 'edge']).default('undetectable'),
  ageOutsideTable: z.enum(['refuse', 'edge']).default('refuse'),
  /** Age nodes on each side of the median; if absent, ages are integrated exactly where a star has one curve. */
  ageNodesPerSide: z.number().int().min(5).max(80).optional(),
  /** Raises the limits close to the star for its few resolution elements; null: curves as given. */
  smallSample: z
    .strictObject({ fwhmArcsec: positiveSchema.max(10) })
    .nullable()
    .default(null),
  /** Semi-major axes on which a listed stellar companion lets nothing stay: completeness 0 there. */
  unstableZone: z.enum(['ignore', 'remove']).default('ignore'),
  /** Candidates and ambiguous companions: cut the curves where they lie, or leave them alone. */
  candidates: z.enum(['ignore', 'cut']).default('ignore'),
  /** Half-width of the annulus that a candidate cuts. */
  candidateHalfWidthArcsec: positiveSchema.max(10).default(0.1),
  /** Age, uniform in its logarithm, of a star outside the group whose member it may be. */
  fieldAge: z
    .strictObject({
      minMyr: positiveSchema.max(13_800),
      maxMyr: positiveSchema.max(13_800),
    })
    .refine((age) => age.minMyr < age.maxMyr, { path: ['minMyr'], error: 'minMyr below maxMyr' })
    .nullable()
    .default(null),
  massMjup: axisRangeSchema.default({ min: 0.5, max: 80, count: 56 }),
  semiMajorAxisAu: axisRangeSchema.default({ min: 1, max: 1000, count: 64 }),
});
export type MapSettings = z.infer<typeof mapSettingsSchema>;

export const mapViewSchema = z.object({
  id: idSchema,
  digest: z.string(),
  origin: z.enum(['computed', 'uploaded']),
  engineVersion: z.string(),
  checksum: z.string(),
  massMjup: z.array(z.number()),
  semiMajorAxisAu: z.array(z.number()),
  /** Rows of mass, columns of semi-major axis; what uint16 storage keeps, within 7.7e-6. */
  completeness: z.array(z.array(z.number())),
  report: z.record(z.string(), z.unknown()),
  inputs: z.record(z.string(), z.unknown()),
});
export type MapView = z.infer<typeof mapViewSchema>;
