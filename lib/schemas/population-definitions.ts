import { z } from 'zod';
import { positiveSchema } from './common';

/** Most companions, and most systems, of one table of systems. */
export const MOST_TABULATED = 20_000;
/** Most places of a tabulated law. */
export const MOST_PLACES = 500;

const indexSchema = z.number().finite().min(-10).max(10);
const notNegative = z.number().finite().min(0);

/** A law along one axis; densities are per d ln x, indices follow the convention of the request. */
export const axisShapeSchema = z.discriminatedUnion('shape', [
  z.strictObject({ shape: z.literal('power-law'), index: indexSchema }),
  z.strictObject({
    shape: z.literal('broken-power-law'),
    breakAt: positiveSchema,
    innerIndex: indexSchema,
    outerIndex: indexSchema,
  }),
  z.strictObject({
    shape: z.literal('log-normal'),
    median: positiveSchema,
    /** Standard deviation of log10 x. */
    sigmaDex: positiveSchema.max(10),
  }),
  /** A distribution of one's own: linear in ln x between its places, nothing outside them. */
  z.strictObject({
    shape: z.literal('tabulated'),
    at: z.array(positiveSchema).min(2).max(MOST_PLACES),
    perLog: z.array(notNegative).min(2).max(MOST_PLACES),
  }),
]);

/** rate_j = rate (M_j/referenceMsun)^index. */
export const hostScalingSchema = z.strictObject({
  index: indexSchema,
  referenceMsun: positiveSchema,
});

const massRange = { massMinMjup: positiveSchema, massMaxMjup: positiveSchema };
const axisRange = { semiMajorAxisMinAu: positiveSchema, semiMajorAxisMaxAu: positiveSchema };
const scaled = { hostScaling: hostScalingSchema.optional() };

interface MassRange {
  massMinMjup: number;
  massMaxMjup: number;
}
interface AxisRange {
  semiMajorAxisMinAu: number;
  semiMajorAxisMaxAu: number;
}
const massInOrder = (p: MassRange) => p.massMinMjup < p.massMaxMjup;
const massFault = { path: ['massMinMjup'], error: 'massMinMjup below massMaxMjup' };
const axisInOrder = (p: AxisRange) => p.semiMajorAxisMinAu < p.semiMajorAxisMaxAu;
const axisFault = {
  path: ['semiMajorAxisMinAu'],
  error: 'semiMajorAxisMinAu below semiMajorAxisMaxAu',
};

export const powerLawDefinitionSchema = z
  .strictObject({
    form: z.literal('power-law'),
    ...massRange,
    ...axisRange,
    massIndex: indexSchema,
    semiMajorAxisIndex: indexSchema,
    ...scaled,
  })
  .refine(massInOrder, massFault)
  .refine(axisInOrder, axisFault);

export const shapedDefinitionSchema = z
  .strictObject({
    form: z.literal('shaped'),
    ...massRange,
    ...axisRange,
    mass: axisShapeSchema,
    semiMajorAxis: axisShapeSchema,
    ...scaled,
  })
  .refine(massInOrder, massFault)
  .refine(axisInOrder, axisFault);

export const massRatioDefinitionSchema = z
  .strictObject({
    form: z.literal('mass-ratio'),
    massRatioMin: positiveSchema.max(1),
    massRatioMax: positiveSchema.max(1),
    massRatioIndex: indexSchema,
    ...axisRange,
    semiMajorAxis: axisShapeSchema,
    ...scaled,
  })
  .refine((p) => p.massRatioMin < p.massRatioMax, {
    path: ['massRatioMin'],
    error: 'massRatioMin below massRatioMax',
  })
  .refine(axisInOrder, axisFault);

/** Whole systems in columns; `companionSystem` names the system of each companion, from 0. */
export const systemsDefinitionSchema = z
  .strictObject({
    form: z.literal('systems'),
    weight: z.array(notNegative).min(1).max(MOST_TABULATED),
    companionSystem: z
      .array(
        z
          .number()
          .int()
          .min(0)
          .max(MOST_TABULATED - 1),
      )
      .min(1)
      .max(MOST_TABULATED),
    massMjup: z.array(positiveSchema).max(MOST_TABULATED),
    semiMajorAxisAu: z.array(positiveSchema).max(MOST_TABULATED),
  })
  .refine((p) => p.massMjup.length === p.companionSystem.length, {
    path: ['massMjup'],
    error: 'as many masses as companions',
  })
  .refine((p) => p.semiMajorAxisAu.length === p.companionSystem.length, {
    path: ['semiMajorAxisAu'],
    error: 'as many semi-major axes as companions',
  });

/** As stored: indices per natural logarithm (dN/d ln m ∝ m^massIndex). */
export const populationDefinitionSchema = z.discriminatedUnion('form', [
  powerLawDefinitionSchema,
  shapedDefinitionSchema,
  massRatioDefinitionSchema,
  systemsDefinitionSchema,
]);
export type PopulationDefinition = z.infer<typeof populationDefinitionSchema>;

/** Tabulated systems without their companions: how many there are, and the box that holds them. */
export const systemsSummarySchema = z.strictObject({
  form: z.literal('systems'),
  systems: z.number(),
  companions: z.number(),
  massMinMjup: z.number(),
  massMaxMjup: z.number(),
  semiMajorAxisMinAu: z.number(),
  semiMajorAxisMaxAu: z.number(),
});

/** A definition as lists hold it: of tabulated systems a summary, all others whole. */
export const listedDefinitionSchema = z.discriminatedUnion('form', [
  powerLawDefinitionSchema,
  shapedDefinitionSchema,
  massRatioDefinitionSchema,
  systemsSummarySchema,
]);
export type ListedDefinition = z.infer<typeof listedDefinitionSchema>;

/** A power law whose rate is the same for all stars: what moving a handle can answer at once. */
export type PowerLawDefinition = z.infer<typeof powerLawDefinitionSchema>;

/** Laws on one box for all stars. */
export type BoxedDefinition = PowerLawDefinition | z.infer<typeof shapedDefinitionSchema>;
