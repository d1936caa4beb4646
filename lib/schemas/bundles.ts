import { z } from 'zod';
import { analysisRecipeSchema } from './analyses';
import { combinationDefinitionSchema } from './combinations';
import { idSchema, moment } from './common';
import { populationDefinitionSchema } from './population-definitions';
import { runResultSchema } from './runs';
import { sampleDefinitionSchema } from './samples';
import { mapSettingsSchema } from './sensitivity';
import { sharedInputSchema } from './sharing';

const digestSchema = z.string().regex(/^[0-9a-f]{64}$/, 'a SHA-256 in hexadecimal');
const finite = z.number().finite();
const optionalNumber = finite.nullable();
const optionalText = z.string().max(10_000).nullable();
const attributesSchema = z.record(z.string(), z.unknown());

/** What a run must give again; the portable ones hold wherever it is made, whatever its ids. */
export const bundleExpectationSchema = z.object({
  inputsDigest: digestSchema,
  resultDigest: digestSchema,
  portableInputs: digestSchema,
  portableResult: digestSchema,
  limit: finite,
});
export type BundleExpectation = z.infer<typeof bundleExpectationSchema>;

const versionFields = {
  id: idSchema,
  number: z.number().int().positive(),
  version: z.number().int().positive(),
  name: z.string().min(1).max(100),
  digest: digestSchema,
};

/** recipe.json: the question, and everything that it names. */
export const bundleRecipeSchema = z.object({
  format: z.literal('rarebound-bundle'),
  version: z.literal(1),
  state: z.string(),
  analysis: z.object({ number: z.number().int().positive(), name: z.string().min(1).max(120) }),
  run: z.object({
    number: z.number().int().positive(),
    seed: z.string().max(100),
    engineVersion: z.string().max(40),
    startedAt: moment,
    finishedAt: moment,
    by: z.string().nullable(),
  }),
  recipe: analysisRecipeSchema,
  expected: bundleExpectationSchema,
  surveys: z
    .array(
      z.object({
        id: idSchema,
        slug: z.string().regex(/^[a-z0-9][a-z0-9-]{0,38}$/),
        name: z.string().min(1).max(60),
        description: z.string().max(10_000),
        band: z.string().max(40),
        observedFrom: z.number().int().nullable(),
        observedTo: z.number().int().nullable(),
        position: z.number().int(),
        mapSettings: mapSettingsSchema,
      }),
    )
    .min(1)
    .max(200),
  population: z.object({
    ...versionFields,
    note: z.string(),
    definition: populationDefinitionSchema,
  }),
  sample: z.object({ ...versionFields, definition: sampleDefinitionSchema }).nullable(),
  combination: z.object({ ...versionFields, definition: combinationDefinitionSchema }).nullable(),
  /** Surveys of other collaborations, each with its attribution, where the run used any. */
  shared: z.array(sharedInputSchema).optional(),
  /** Adopted ages and distances: each with its table's number. */
  adopted: z.object({
    newest: z.object({ age: z.number().nullable(), distance: z.number().nullable() }),
    values: z.array(
      z.object({
        quantity: z.enum(['age', 'distance']),
        starId: idSchema,
        value: z.record(z.string(), finite.nullable()),
        source: z.string(),
        table: z.number().int().positive(),
      }),
    ),
  }),
});
export type BundleRecipe = z.infer<typeof bundleRecipeSchema>;

export const bundleStarSchema = z.object({
  id: idSchema,
  name: z.string().min(1).max(100),
  gaiaDr3Id: z.string().nullable(),
});

export const bundleTargetSchema = z.object({
  id: idSchema,
  surveyId: idSchema,
  starId: idSchema,
  name: z.string().min(1).max(100),
  otherNames: z.array(z.string()),
  gaiaDr3Id: z.string().nullable(),
  raDeg: optionalNumber,
  decDeg: optionalNumber,
  distancePc: optionalNumber,
  distanceErrorPc: optionalNumber,
  parallaxMas: optionalNumber,
  parallaxErrorMas: optionalNumber,
  ageMyr: optionalNumber,
  ageLowerMyr: optionalNumber,
  ageUpperMyr: optionalNumber,
  ageMinMyr: optionalNumber,
  ageMaxMyr: optionalNumber,
  hostMassMsun: optionalNumber,
  spectralType: optionalText,
  movingGroup: optionalText,
  magnitudes: z.record(z.string(), z.object({ valueMag: finite, errorMag: optionalNumber })),
  attributes: attributesSchema,
  leftOutReason: optionalText,
  /** Digest of the map that was brought in ready; null where the curves give one, or there is none. */
  mapDigest: digestSchema.nullable(),
});

export const bundleCurveSchema = z.object({
  id: idSchema,
  targetId: idSchema,
  band: z.string().max(40),
  epoch: optionalText,
  nSigma: finite,
  separationArcsec: z.array(finite).min(1).max(10_000),
  contrastMag: z.array(finite).min(1).max(10_000),
  coverage: z.array(finite).max(10_000).nullable(),
  instrument: optionalText,
  reference: optionalText,
  digest: digestSchema,
});

export const bundleCompanionSchema = z.object({
  id: idSchema,
  targetId: idSchema,
  name: z.string().min(1).max(100),
  status: z.enum(['confirmed', 'candidate', 'ambiguous', 'background']),
  massMjup: optionalNumber,
  massErrorLowerMjup: optionalNumber,
  massErrorUpperMjup: optionalNumber,
  semiMajorAxisAu: optionalNumber,
  semiMajorAxisErrorLowerAu: optionalNumber,
  semiMajorAxisErrorUpperAu: optionalNumber,
  probability: optionalNumber,
  attributes: attributesSchema,
  reference: optionalText,
});

export const bundleCoolingTableSchema = z.object({
  id: idSchema,
  name: z.string().min(1).max(100),
  massMjup: z.array(finite),
  ageMyr: z.array(finite),
  magnitudes: z.record(z.string(), z.array(optionalNumber)),
  digest: digestSchema,
  startCondition: z.enum(['hot', 'warm', 'cold', 'unstated']),
});

export const bundleMapSchema = z.object({
  digest: digestSchema,
  engineVersion: z.string(),
  massMjup: z.array(finite).min(2).max(512),
  semiMajorAxisAu: z.array(finite).min(2).max(512),
  /** uint16 = round(65535 C), little-endian, row-major [mass, semi-major axis], in base64. */
  nodeValues: z.base64(),
  checksum: digestSchema,
  inputs: attributesSchema,
  report: attributesSchema,
});

/** Every file under inputs/ with what it lists. */
export const bundleInputs = {
  'stars.json': z.array(bundleStarSchema).min(1),
  'targets.json': z.array(bundleTargetSchema).min(1),
  'curves.json': z.array(bundleCurveSchema),
  'companions.json': z.array(bundleCompanionSchema),
  'cooling-tables.json': z.array(bundleCoolingTableSchema),
  'maps.json': z.array(bundleMapSchema),
} as const;

/** A bundle's run, read and checked. */
export interface BundleContent {
  recipe: BundleRecipe;
  stars: z.infer<typeof bundleStarSchema>[];
  targets: z.infer<typeof bundleTargetSchema>[];
  curves: z.infer<typeof bundleCurveSchema>[];
  companions: z.infer<typeof bundleCompanionSchema>[];
  coolingTables: z.infer<typeof bundleCoolingTableSchema>[];
  maps: z.infer<typeof bundleMapSchema>[];
  /** As the bundle states it. */
  result: z.infer<typeof runResultSchema>;
}

export const bundleResultSchema = runResultSchema;

export const bundleImportSchema = z.object({
  id: idSchema,
  title: z.string(),
  fileSha256: z.string(),
  analysisKey: z.string(),
  run: z.object({ id: idSchema, number: z.number() }),
  status: z.enum(['waiting', 'running', 'done', 'failed', 'cancelled']),
  fault: z.string().nullable(),
  /** Null before the run has ended. */
  agreement: z
    .object({
      isSameInputs: z.boolean(),
      isSameResult: z.boolean(),
      limit: z.number(),
      expectedLimit: z.number(),
    })
    .nullable(),
  importedBy: z.string().nullable(),
  createdAt: moment,
});
export type BundleImportView = z.infer<typeof bundleImportSchema>;
