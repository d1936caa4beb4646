import { z } from 'zod';
import { idSchema } from './common';
import { jobSchema } from './jobs';

/** The first part in which a stored map differs from the one that its target should have now. */
export const mapReasonSchema = z.enum([
  'engine',
  'curve',
  'age',
  'distance',
  'magnitude',
  'membership',
  'stellar-companion',
  'candidates',
  'cooling',
  'settings',
  'grid',
  'uploaded',
  'not-computed',
  'other',
]);
export type MapReason = z.infer<typeof mapReasonSchema>;

export const mapStandingSchema = z.enum([
  'current',
  'stale',
  'missing',
  'failed',
  /** As it was brought: it follows from no curve. */
  'uploaded',
  /** Neither a curve nor a map. */
  'none',
]);
export type MapStanding = z.infer<typeof mapStandingSchema>;

export const mapStateSchema = z.object({
  target: z.string(),
  targetId: idSchema,
  mapId: idSchema.nullable(),
  standing: mapStandingSchema,
  reason: mapReasonSchema.nullable(),
  /** Why it is not current, as a sentence without its full stop. */
  words: z.string().nullable(),
});
export type MapState = z.infer<typeof mapStateSchema>;

/** How the maps of each survey stand. */
export const mapStoreSchema = z.object({
  surveys: z.array(
    z.object({
      slug: z.string(),
      name: z.string(),
      position: z.number(),
      standings: z.record(mapStandingSchema, z.number()),
      reasons: z.array(z.object({ reason: mapReasonSchema, maps: z.number() })),
      canRefresh: z.boolean(),
    }),
  ),
});
export type MapStore = z.infer<typeof mapStoreSchema>;

/** The state of each target's map of a survey, and the newest computation. */
export const surveyMapsSchema = z.object({
  job: jobSchema.nullable(),
  maps: z.array(
    mapStateSchema.extend({
      state: z.string(),
      fault: z.string().nullable(),
      digest: z.string().nullable(),
      checksum: z.string().nullable(),
    }),
  ),
});
export type SurveyMaps = z.infer<typeof surveyMapsSchema>;
