import type { Transaction } from 'sequelize';
import { foldName } from '@/lib/formats';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { PopulationDefinition } from '@/lib/schemas/populations';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import {
  AnalysisRow,
  CompanionRow,
  ContrastCurveRow,
  PopulationRow,
  StarRow,
  SurveyRow,
  TargetRow,
} from '@/models';
import { digestOf } from '@/models/digest';
import { POPULATION } from './population';

/** A grid small enough that hundreds of maps take seconds. */
export const SMALL_GRID = {
  massMjup: { min: 1, max: 60, count: 6 },
  semiMajorAxisAu: { min: 3, max: 300, count: 6 },
};

let made = 0;
const next = () => ++made;

export async function buildSurvey(
  collaborationId: string,
  given: {
    name?: string;
    band?: string;
    leadId?: string;
    mapSettings?: unknown;
    transaction?: Transaction;
  } = {},
): Promise<SurveyRow> {
  const name = given.name ?? `Survey ${next()}`;
  return SurveyRow.create(
    {
      collaborationId,
      slug: name.toLowerCase().replace(/[^a-z0-9]+/g, '-'),
      name,
      band: given.band ?? 'H',
      leadId: given.leadId ?? null,
      position: await SurveyRow.count({ where: { collaborationId } }),
      mapSettings: mapSettingsSchema.parse(given.mapSettings ?? SMALL_GRID),
    },
    { transaction: given.transaction },
  );
}

export interface CurveFields {
  band?: string;
  epoch?: string;
  nSigma?: number;
  separationArcsec?: number[];
  contrastMag?: number[];
  coverage?: number[] | null;
}

const curveOf = (given: CurveFields) => ({
  band: given.band ?? 'H',
  epoch: given.epoch ?? null,
  nSigma: given.nSigma ?? 5,
  separationArcsec: given.separationArcsec ?? [0.15, 0.3, 0.6, 1.2, 2.5, 5],
  contrastMag: given.contrastMag ?? [7, 9.5, 11.5, 13, 14, 14.2],
  coverage: given.coverage ?? null,
});

export async function buildCurve(target: TargetRow, given: CurveFields = {}) {
  const curve = curveOf(given);
  return ContrastCurveRow.create({
    collaborationId: target.collaborationId,
    targetId: target.id,
    ...curve,
    digest: digestOf(curve),
  });
}

export type TargetFields = Partial<TargetRow['dataValues']> & { curves?: CurveFields[] };

/** A star as a survey lists it, with its curves; a star of the same name is the same star. */
export async function buildTarget(survey: SurveyRow, given: TargetFields = {}) {
  const { curves = [{}], ...fields } = given;
  const name = fields.name ?? `Star ${String(next()).padStart(4, '0')}`;
  const { collaborationId } = survey;
  const [star] = await StarRow.findOrCreate({
    where: { collaborationId, foldedName: foldName(name) },
    defaults: { collaborationId, name, foldedName: foldName(name) },
  });
  const target = await TargetRow.create({
    collaborationId,
    surveyId: survey.id,
    starId: star.id,
    name,
    foldedName: foldName(name),
    distancePc: 25,
    distanceErrorPc: 0.3,
    ageMyr: 45,
    ageLowerMyr: 40,
    ageUpperMyr: 52,
    magnitudes: { H: { valueMag: 6.2, errorMag: null } },
    ...fields,
  });
  for (const curve of curves) await buildCurve(target, curve);
  return target;
}

/** Invented stars, each with a curve of its own: no two maps are alike. */
export async function buildStars(survey: SurveyRow, count: number): Promise<void> {
  const { collaborationId, id: surveyId } = survey;
  const names = Array.from({ length: count }, (_, i) => `Star ${String(i + 1).padStart(4, '0')}`);
  const stars = await StarRow.bulkCreate(
    names.map((name) => ({ collaborationId, name, foldedName: foldName(name) })),
    { returning: true },
  );
  const targets = await TargetRow.bulkCreate(
    stars.map(({ id: starId, name, foldedName }, i) => ({
      ...{ collaborationId, surveyId, starId, name, foldedName },
      distancePc: 12 + (i % 53) * 0.9 + i * 0.001,
      distanceErrorPc: 0.3,
      ageMyr: 20 + (i % 29) * 5,
      ageLowerMyr: 18 + (i % 29) * 5,
      ageUpperMyr: 24 + (i % 29) * 5,
      magnitudes: { H: { valueMag: 6.2, errorMag: null } },
    })),
    { returning: true },
  );
  await ContrastCurveRow.bulkCreate(
    targets.map(({ id: targetId }, i) => {
      const depth = (i % 17) * 0.13;
      const curve = curveOf({ contrastMag: [7, 9.5, 11.5, 13, 14, 14.2].map((m) => m + depth) });
      return { collaborationId, targetId, ...curve, digest: digestOf(curve) };
    }),
  );
}

export function buildCompanion(target: TargetRow, given: Partial<CompanionRow['dataValues']> = {}) {
  const name = given.name ?? 'b';
  return CompanionRow.create({
    collaborationId: target.collaborationId,
    targetId: target.id,
    name,
    foldedName: foldName(name),
    status: 'confirmed',
    massMjup: 12,
    semiMajorAxisAu: 45,
    ...given,
  });
}

export async function buildPopulation(
  collaborationId: string,
  definition: PopulationDefinition = POPULATION,
): Promise<PopulationRow> {
  return PopulationRow.create({
    collaborationId,
    number: (await PopulationRow.count({ where: { collaborationId } })) + 1,
    version: 1,
    name: 'a power law',
    definition,
    digest: digestOf(definition),
    isShared: true,
  });
}

export function recipeOf(
  surveys: SurveyRow[],
  population: PopulationRow,
  given: Partial<AnalysisRecipe> = {},
): AnalysisRecipe {
  return {
    surveyIds: surveys.map(({ id }) => id),
    populationId: population.id,
    likelihood: 'host-fraction',
    prior: { law: 'uniform', max: 1 },
    credibleLevel: 0.95,
    detections: 'counted',
    combination: 'default',
    zeroOutsideMaps: false,
    ...given,
  };
}

export async function buildAnalysis(
  collaborationId: string,
  recipe: AnalysisRecipe,
  createdBy: string | null = null,
): Promise<AnalysisRow> {
  const number = (await AnalysisRow.count({ where: { collaborationId } })) + 1;
  return AnalysisRow.create({
    collaborationId,
    number,
    name: `Question ${number}`,
    recipe,
    createdBy,
  });
}
