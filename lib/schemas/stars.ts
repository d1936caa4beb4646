import { z } from 'zod';
import { idSchema, lineSchema, moment, pageSchema, positiveSchema } from './common';
import { companionSchema, curveSchema } from './surveys';
import { yardstickSchema } from './yardstick';

const errorSchema = z.number().finite().min(0);

/** How a star was found to be one that was known. */
export const matchEvidenceSchema = z.object({
  by: z.enum(['identifier', 'name', 'position']),
  /** The identifier or name that two tables share. */
  found: z.string().optional(),
  /** At the common epoch, after proper motion. */
  separationArcsec: z.number().optional(),
  epochYr: z.number().optional(),
  /** How many of the two have a proper motion. */
  motions: z.number().int().min(0).max(2).optional(),
  /** Larger over smaller; null where a distance is not known. */
  distanceRatio: z.number().nullable().optional(),
});
export type MatchEvidence = z.infer<typeof matchEvidenceSchema>;

export const matchStateSchema = z.enum(['proposed', 'confirmed', 'refused', 'undone']);
export type MatchState = z.infer<typeof matchStateSchema>;

export const adoptedQuantitySchema = z.enum(['age', 'distance']);
export type AdoptedQuantity = z.infer<typeof adoptedQuantitySchema>;

/** As the columns of a table of targets; a median, hard bounds, or both. */
export const ageValueSchema = z
  .strictObject({
    ageMyr: positiveSchema.max(13_800).nullable(),
    ageLowerMyr: positiveSchema.nullable().default(null),
    ageUpperMyr: positiveSchema.nullable().default(null),
    ageMinMyr: positiveSchema.nullable().default(null),
    ageMaxMyr: positiveSchema.max(13_800).nullable().default(null),
  })
  .refine(({ ageMyr, ageMinMyr, ageMaxMyr }) => ageMyr !== null || (ageMinMyr && ageMaxMyr), {
    message: 'an age, or a lower and an upper bound',
  })
  .refine(
    ({ ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr }) => {
      const order = [ageMinMyr, ageLowerMyr, ageMyr, ageUpperMyr, ageMaxMyr].filter(
        (value) => value !== null,
      );
      return order.every((value, i) => i === 0 || value >= order[i - 1]);
    },
    { message: 'bounds and errors around the age, in their order' },
  );
export type AgeValue = z.infer<typeof ageValueSchema>;

export const distanceValueSchema = z
  .strictObject({
    distancePc: positiveSchema.nullable(),
    distanceErrorPc: errorSchema.nullable().default(null),
    parallaxMas: positiveSchema.nullable().default(null),
    parallaxErrorMas: errorSchema.nullable().default(null),
  })
  .refine(({ distancePc, parallaxMas }) => distancePc !== null || parallaxMas !== null, {
    message: 'a distance or a parallax',
  });
export type DistanceValue = z.infer<typeof distanceValueSchema>;

const surveyRefSchema = z.object({ slug: z.string(), name: z.string(), position: z.number() });

/** A star as one survey lists it. */
export const starEntrySchema = z.object({
  targetId: idSchema,
  survey: surveyRefSchema,
  name: z.string(),
  otherNames: z.array(z.string()),
  gaiaDr3Id: z.string().nullable(),
  raDeg: z.number().nullable(),
  decDeg: z.number().nullable(),
  spectralType: z.string().nullable(),
  movingGroup: z.string().nullable(),
  hostMassMsun: z.number().nullable(),
  age: ageValueSchema.nullable(),
  distance: distanceValueSchema.nullable(),
  reference: z.string().nullable(),
  epochs: z.number(),
  mapId: idSchema.nullable(),
  mapState: z.enum(['none', 'waiting', 'ready', 'failed']),
  mapFault: z.string().nullable(),
  probability: z.number().nullable(),
  leftOutReason: z.string().nullable(),
  evidence: matchEvidenceSchema.nullable(),
});
export type StarEntry = z.infer<typeof starEntrySchema>;

/** Where the value that maps rest on comes from. */
export const valueSourceSchema = z.object({
  kind: z.enum(['adopted', 'survey']),
  /** "ages table 3, from HALYARD", or the survey's name. */
  words: z.string(),
  table: z.number().nullable(),
});

export const starSchema = z.object({
  id: idSchema,
  name: z.string(),
  gaiaDr3Id: z.string().nullable(),
  otherNames: z.array(z.string()),
  entries: z.array(starEntrySchema),
  age: z.object({ value: ageValueSchema, source: valueSourceSchema }).nullable(),
  distance: z.object({ value: distanceValueSchema, source: valueSourceSchema }).nullable(),
  /** How far the surveys' values lie apart, in sigmas; "differs" where none has an error. */
  conflicts: z.object({
    age: z.union([z.number(), z.literal('differs')]).nullable(),
    distance: z.union([z.number(), z.literal('differs')]).nullable(),
  }),
  epochs: z.number(),
  /** Under the yardstick, of the entry that sees most. */
  probability: z.number().nullable(),
  undecided: z.number(),
});
export type StarView = z.infer<typeof starSchema>;

export const starQuerySchema = z.strictObject({
  ...pageSchema.shape,
  q: z.string().trim().max(100).optional(),
  survey: z.string().max(39).optional(),
  only: z.enum(['shared', 'age-conflict', 'distance-conflict', 'adopted', 'undecided']).optional(),
});
export type StarQuery = z.infer<typeof starQuerySchema>;

export const starListSchema = z.object({
  stars: z.array(starSchema),
  /** After the filters. */
  total: z.number(),
  /** What detection probabilities are averaged over; without one there are none. */
  yardstick: yardstickSchema.nullable(),
  /** Of the whole collaboration. */
  counts: z.object({
    stars: z.number(),
    entries: z.number(),
    shared: z.number(),
    undecided: z.number(),
    ageConflicts: z.number(),
    distanceConflicts: z.number(),
  }),
});
export type StarList = z.infer<typeof starListSchema>;

const matchedStarSchema = z.object({
  id: idSchema,
  name: z.string(),
  entries: z.array(
    z.object({
      targetId: idSchema,
      name: z.string(),
      survey: surveyRefSchema,
      raDeg: z.number().nullable(),
      decDeg: z.number().nullable(),
      epochYr: z.number(),
      pmRaMasYr: z.number().nullable(),
      pmDecMasYr: z.number().nullable(),
      distancePc: z.number().nullable(),
      spectralType: z.string().nullable(),
    }),
  ),
});

export const starMatchSchema = z.object({
  id: idSchema,
  state: matchStateSchema,
  evidence: matchEvidenceSchema,
  /** 0: as good as sure, 1: at the edge of the rule. */
  doubt: z.number(),
  /** Near enough to the middle of the rule, and the only pair of its stars, to be taken with others. */
  isPlain: z.boolean(),
  stars: z.tuple([matchedStarSchema, matchedStarSchema]),
  decidedBy: z.string().nullable(),
  decidedAt: moment.nullable(),
  why: z.string().nullable(),
});
export type StarMatchView = z.infer<typeof starMatchSchema>;

export const overlapsSchema = z.object({
  open: z.array(starMatchSchema),
  decided: z.array(starMatchSchema),
  /** Joined when their tables were stored. */
  automatic: z.object({ identifier: z.number(), name: z.number() }),
  entries: z.number(),
  stars: z.number(),
  canDecide: z.boolean(),
});
export type Overlaps = z.infer<typeof overlapsSchema>;

export const proposedSchema = z.object({ proposed: z.number() });
export const decisionSchema = z.strictObject({ why: lineSchema(300) });
export const decideManySchema = z.strictObject({
  pairs: z.array(idSchema).min(1).max(500),
  why: lineSchema(300),
});
export const splitSchema = z.strictObject({ targetId: idSchema, why: lineSchema(300) });

/** The value of one of the star's entries, one from elsewhere, or each survey's own again. */
const choiceOf = <Value extends z.ZodType>(value: Value) =>
  z.union([
    z.strictObject({ kind: z.literal('entry'), targetId: idSchema }),
    z.strictObject({ kind: z.literal('value'), value, source: lineSchema(200) }),
    z.strictObject({ kind: z.literal('none') }),
  ]);
const ageChoiceSchema = choiceOf(ageValueSchema);
const distanceChoiceSchema = choiceOf(distanceValueSchema);

export const adoptSchema = z.discriminatedUnion('quantity', [
  z.strictObject({
    quantity: z.literal('age'),
    choice: ageChoiceSchema,
    why: lineSchema(300),
  }),
  z.strictObject({
    quantity: z.literal('distance'),
    choice: distanceChoiceSchema,
    why: lineSchema(300),
  }),
]);
export type Adoption = z.infer<typeof adoptSchema>;

/** Most stars of one table that a person fills at once. */
const MOST_STARS = 200;
const ofStars = <Choice extends z.ZodType>(choice: Choice) =>
  z
    .array(z.strictObject({ starId: idSchema, choice }))
    .min(1, 'at least one star')
    .max(MOST_STARS)
    .refine(
      (choices) => new Set(choices.map(({ starId }) => starId)).size === choices.length,
      'each star once',
    );

/** Which values would be adopted, for several stars in one table. */
export const previewAdoptionSchema = z.discriminatedUnion('quantity', [
  z.strictObject({ quantity: z.literal('age'), choices: ofStars(ageChoiceSchema) }),
  z.strictObject({ quantity: z.literal('distance'), choices: ofStars(distanceChoiceSchema) }),
]);
export type AdoptionChoices = z.infer<typeof previewAdoptionSchema>;

export const adoptManySchema = z.discriminatedUnion('quantity', [
  z.strictObject({
    quantity: z.literal('age'),
    choices: ofStars(ageChoiceSchema),
    why: lineSchema(300),
  }),
  z.strictObject({
    quantity: z.literal('distance'),
    choices: ofStars(distanceChoiceSchema),
    why: lineSchema(300),
  }),
]);
export type AdoptMany = z.infer<typeof adoptManySchema>;

/** How the limit of the lead analysis would move, computed from its newest run. */
export const adoptionPreviewSchema = z.object({
  lead: z.object({ key: z.string(), name: z.string(), run: z.number() }).nullable(),
  level: z.number().nullable(),
  isFraction: z.boolean(),
  /** Stars of that run whose maps would change. */
  stars: z.number(),
  /** With the values that hold now, and with those to be adopted; null with `missing` saying why. */
  before: z.number().nullable(),
  after: z.number().nullable(),
  missing: z.string().nullable(),
});
export type AdoptionPreview = z.infer<typeof adoptionPreviewSchema>;

export const valueTableSchema = z.object({
  quantity: adoptedQuantitySchema,
  number: z.number(),
  why: z.string(),
  createdBy: z.string().nullable(),
  createdAt: moment,
  /** Stars with an adopted value in this table. */
  stars: z.number(),
  changes: z.array(
    z.object({
      starId: idSchema,
      star: z.string(),
      value: z.union([ageValueSchema, distanceValueSchema]).nullable(),
      source: z.string(),
    }),
  ),
});
export type ValueTableView = z.infer<typeof valueTableSchema>;
export const valueTablesSchema = z.object({ tables: z.array(valueTableSchema) });

/** One star with everything that hangs on it. */
export const starPageSchema = starSchema.extend({
  /** What the detection probabilities of its entries are averaged over. */
  yardstick: yardstickSchema.nullable(),
  curves: z.array(curveSchema.extend({ targetId: idSchema, survey: z.string() })),
  companions: z.array(companionSchema.extend({ survey: z.string() })),
  analyses: z.array(
    z.object({
      key: z.string(),
      name: z.string(),
      run: z.number(),
      probability: z.number(),
      /** What that probability is averaged over; ranges where it has one box for all stars. */
      population: z.string(),
      ranges: yardstickSchema
        .pick({
          massMinMjup: true,
          massMaxMjup: true,
          semiMajorAxisMinAu: true,
          semiMajorAxisMaxAu: true,
        })
        .nullable(),
      /** Of the sum of detection probabilities of that run. */
      share: z.number(),
    }),
  ),
  /** The newest map that a run combined from several surveys. */
  combined: z
    .object({
      mapId: idSchema,
      rule: z.string(),
      surveys: z.array(z.string()),
      key: z.string(),
      run: z.number(),
    })
    .nullable(),
  matches: z.array(starMatchSchema),
  can: z.object({ combine: z.boolean(), adopt: z.boolean() }),
});
export type StarPage = z.infer<typeof starPageSchema>;
