import { z } from 'zod';
import {
  idSchema,
  lineSchema,
  moment,
  personRefSchema,
  rateQuantitySchema,
  slugSchema,
} from './common';
import { startConditionSchema } from './cooling';
import { jobSchema } from './jobs';
import { mapSettingsSchema } from './sensitivity';
import { sharedFromSchema } from './sharing';
import { yardstickSchema } from './yardstick';

export type { MapSettings } from './sensitivity';

const yearSchema = z.number().int().min(1950).max(2100);

interface Years {
  observedFrom?: number | null | undefined;
  observedTo?: number | null | undefined;
}
/** Whether the years are in order, as far as both are known. */
export const areYearsInOrder = ({ observedFrom, observedTo }: Years) =>
  observedFrom == null || observedTo == null || observedFrom <= observedTo;
export const LAST_YEAR = 'a last year that is not before the first';
const yearsFault = { path: ['observedTo'], error: LAST_YEAR };

const factFields = {
  name: lineSchema(60),
  band: lineSchema(12),
  description: z.string().max(2000).default(''),
  observedFrom: yearSchema.nullable().default(null),
  observedTo: yearSchema.nullable().default(null),
};
/** What a survey is called and when it observed. */
export const surveyFactsSchema = z.strictObject(factFields).refine(areYearsInOrder, yearsFault);

export const createSurveySchema = z
  .strictObject({
    ...factFields,
    slug: slugSchema.optional(),
    leadId: idSchema.nullable().optional(),
    mapSettings: mapSettingsSchema.prefault({}),
  })
  .refine(areYearsInOrder, yearsFault);
export const updateSurveySchema = z
  .strictObject({
    name: lineSchema(60).optional(),
    band: lineSchema(12).optional(),
    description: z.string().max(2000).optional(),
    observedFrom: yearSchema.nullable().optional(),
    observedTo: yearSchema.nullable().optional(),
    leadId: idSchema.nullable().optional(),
    isArchived: z.boolean().optional(),
    mapSettings: mapSettingsSchema.optional(),
  })
  .refine(areYearsInOrder, yearsFault);

/** The upper limit that a survey's stars give by themselves, as the lead analysis asks. */
export const surveyLimitSchema = z.object({
  /** Whose population, likelihood, prior, level and treatment of detections they are: "A-1". */
  analysis: z.string(),
  quantity: rateQuantitySchema,
  /** Credible level [fraction]. */
  level: z.number(),
  /** [fraction of stars, or companions per star]. */
  limit: z.number(),
  isSetByPrior: z.boolean(),
  stars: z.number(),
  /** Counted. */
  detections: z.number(),
});
export type SurveyLimit = z.infer<typeof surveyLimitSchema>;

export const surveySchema = z.object({
  id: idSchema,
  slug: z.string(),
  name: z.string(),
  band: z.string(),
  description: z.string(),
  observedFrom: z.number().nullable(),
  observedTo: z.number().nullable(),
  lead: personRefSchema.nullable(),
  /** Order of creation, from 0: it gives the survey its colour everywhere. */
  position: z.number(),
  isArchived: z.boolean(),
  mapSettings: mapSettingsSchema,
  targets: z.number(),
  alsoInAnother: z.number(),
  curves: z.number(),
  maps: z.object({
    ready: z.number(),
    waiting: z.number(),
    failed: z.number(),
    none: z.number(),
    /** Made from other inputs than hold now; null while maps are computed, and of archived surveys. */
    stale: z.number().nullable(),
  }),
  companions: z.object({
    confirmed: z.number(),
    candidate: z.number(),
    ambiguous: z.number(),
    background: z.number(),
  }),
  /** Sum over stars of the map averaged over mass at each semi-major axis. */
  depth: z.object({ semiMajorAxisAu: z.array(z.number()), stars: z.array(z.number()) }).nullable(),
  /** Sum of detection probabilities under the yardstick, if there is one. */
  summedCompleteness: z.number().nullable(),
  yardstick: yardstickSchema.nullable(),
  /** Of one survey read by itself: null where the lead analysis cannot be asked of it alone. */
  alone: surveyLimitSchema.nullable().optional(),
  mapJob: jobSchema.nullable(),
  can: z.object({ change: z.boolean(), import: z.boolean(), offer: z.boolean().optional() }),
  /** Where another collaboration owns it. */
  shared: sharedFromSchema.optional(),
  createdAt: moment,
});
export type SurveyView = z.infer<typeof surveySchema>;

export const surveyListSchema = z.object({
  surveys: z.array(surveySchema),
  /** Every star once. */
  stars: z.number(),
  entries: z.number(),
  /** Stars by the set of surveys that list them. */
  overlaps: z.array(z.object({ surveys: z.array(z.string()), stars: z.number() })),
});
export type SurveyList = z.infer<typeof surveyListSchema>;

export const companionSchema = z.object({
  id: idSchema,
  target: z.string(),
  targetId: idSchema,
  name: z.string(),
  status: z.enum(['confirmed', 'candidate', 'ambiguous', 'background']),
  massMjup: z.number().nullable(),
  massErrorLowerMjup: z.number().nullable(),
  massErrorUpperMjup: z.number().nullable(),
  semiMajorAxisAu: z.number().nullable(),
  semiMajorAxisErrorLowerAu: z.number().nullable(),
  semiMajorAxisErrorUpperAu: z.number().nullable(),
  probability: z.number().nullable(),
  reference: z.string().nullable(),
});
export type CompanionView = z.infer<typeof companionSchema>;

export const curveSchema = z.object({
  id: idSchema,
  band: z.string(),
  epoch: z.string().nullable(),
  nSigma: z.number(),
  separationArcsec: z.array(z.number()),
  contrastMag: z.array(z.number()),
});
export type CurveView = z.infer<typeof curveSchema>;

export const targetSchema = z.object({
  id: idSchema,
  starId: idSchema,
  name: z.string(),
  spectralType: z.string().nullable(),
  distancePc: z.number().nullable(),
  distanceErrorPc: z.number().nullable(),
  ageMyr: z.number().nullable(),
  ageLowerMyr: z.number().nullable(),
  ageUpperMyr: z.number().nullable(),
  hostMassMsun: z.number().nullable(),
  movingGroup: z.string().nullable(),
  magnitudes: z.record(
    z.string(),
    z.object({ valueMag: z.number(), errorMag: z.number().nullable() }),
  ),
  curves: z.array(curveSchema),
  mapId: idSchema.nullable(),
  mapState: z.enum(['none', 'waiting', 'ready', 'failed']),
  mapFault: z.string().nullable(),
  /** Detection probability under the yardstick of the list. */
  probability: z.number().nullable(),
  alsoIn: z.array(z.object({ slug: z.string(), name: z.string(), position: z.number() })),
  leftOutReason: z.string().nullable(),
  /** The survey lists it because a companion was known: runs leave such an entry out. */
  selectedForCompanion: z.boolean(),
  /** What a reader should know: "no age error", "starts at 0.31″". */
  checks: z.array(z.string()),
});
export type TargetView = z.infer<typeof targetSchema>;
export const targetListSchema = z.object({
  targets: z.array(targetSchema),
  total: z.number(),
  /** What their detection probabilities are averaged over. */
  yardstick: yardstickSchema,
});
export type TargetList = z.infer<typeof targetListSchema>;
export const leaveOutSchema = z
  .strictObject({
    leftOutReason: lineSchema(300).nullable().optional(),
    selectedForCompanion: z.boolean().optional(),
  })
  .refine(
    (given) => Object.keys(given).length > 0,
    'one of leftOutReason and selectedForCompanion',
  );
export type MarkTarget = z.infer<typeof leaveOutSchema>;

export const coolingTableSchema = z.object({
  id: idSchema,
  name: z.string(),
  bands: z.array(z.string()),
  massMjup: z.array(z.number()),
  ageMyr: z.array(z.number()),
  startCondition: startConditionSchema,
  digest: z.string(),
  createdAt: moment,
});
export type CoolingTableView = z.infer<typeof coolingTableSchema>;
