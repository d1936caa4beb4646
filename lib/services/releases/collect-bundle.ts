import type { Transaction } from 'sequelize';
import { Conflict } from '@/lib/errors';
import type { BundleContent, BundleRecipe } from '@/lib/schemas/bundles';
import {
  CombinationRow,
  CompanionRow,
  CompletenessMapRow,
  ContrastCurveRow,
  CoolingTableRow,
  JobRow,
  PersonRow,
  PopulationRow,
  type RunRow,
  SampleRow,
  StarRow,
  SurveyRow,
  TargetRow,
} from '@/models';
import { loadAdopted } from '@/models/adopted-values';
import { canonicalJson } from '@/models/digest';
import { expectationOf } from '@/models/portable-digest';

/** Fields of a row by name, in plain JSON values. */
function pick<Row extends object, Key extends keyof Row>(row: Row, keys: readonly Key[]) {
  return Object.fromEntries(keys.map((key) => [key, row[key] ?? null])) as {
    [Name in Key]: Exclude<Row[Name], undefined>;
  };
}

const version = ['id', 'number', 'version', 'name', 'digest'] as const;

const targetFields = [
  ...(['id', 'surveyId', 'starId', 'name', 'otherNames', 'gaiaDr3Id', 'raDeg', 'decDeg'] as const),
  ...(['distancePc', 'distanceErrorPc', 'parallaxMas', 'parallaxErrorMas', 'ageMyr'] as const),
  ...(['ageLowerMyr', 'ageUpperMyr', 'ageMinMyr', 'ageMaxMyr', 'hostMassMsun'] as const),
  ...(['spectralType', 'movingGroup', 'magnitudes', 'attributes', 'leftOutReason'] as const),
];
const curveFields = [
  ...(['id', 'targetId', 'band', 'epoch', 'nSigma', 'separationArcsec', 'contrastMag'] as const),
  ...(['coverage', 'instrument', 'reference', 'digest'] as const),
];
const companionFields = [
  ...(['id', 'targetId', 'name', 'status', 'massMjup', 'massErrorLowerMjup'] as const),
  ...(['massErrorUpperMjup', 'semiMajorAxisAu', 'semiMajorAxisErrorLowerAu'] as const),
  ...(['semiMajorAxisErrorUpperAu', 'probability', 'attributes', 'reference'] as const),
];

interface Gathered {
  surveys: SurveyRow[];
  targets: TargetRow[];
}

async function gather(run: RunRow, transaction: Transaction): Promise<Gathered> {
  const { collaborationId, recipe } = run;
  const surveys = await SurveyRow.findAll({
    where: { collaborationId, id: recipe.surveyIds },
    order: [
      ['position', 'ASC'],
      ['id', 'ASC'],
    ],
    transaction,
  });
  const targets = await TargetRow.findAll({
    where: { collaborationId, surveyId: recipe.surveyIds },
    order: [
      ['surveyId', 'ASC'],
      ['foldedName', 'ASC'],
    ],
    transaction,
  });
  return { surveys, targets };
}

async function recipeOf(
  run: RunRow,
  state: string,
  { surveys, targets }: Gathered,
  analysis: { number: number; name: string },
  transaction: Transaction,
): Promise<BundleRecipe> {
  const { collaborationId, recipe } = run;
  const findVersion = { collaborationId };
  const population = await PopulationRow.findOne({
    where: { ...findVersion, id: recipe.populationId },
    rejectOnEmpty: true,
    transaction,
  });
  const sample = recipe.sampleId
    ? await SampleRow.findOne({ where: { ...findVersion, id: recipe.sampleId }, transaction })
    : null;
  const combination = recipe.combinationId
    ? await CombinationRow.findOne({
        where: { ...findVersion, id: recipe.combinationId },
        transaction,
      })
    : null;
  const adopted = await loadAdopted(collaborationId, transaction);
  const job = await JobRow.findByPk(run.jobId, { transaction });
  const person = run.createdBy ? await PersonRow.findByPk(run.createdBy, { transaction }) : null;
  const starIds = new Set(targets.map(({ starId }) => starId));
  const values = (['age', 'distance'] as const).flatMap((quantity) =>
    [...adopted[quantity]]
      .filter(([starId]) => starIds.has(starId))
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([starId, { value, source, table }]) => ({
        quantity,
        starId,
        value: { ...value },
        source,
        table,
      })),
  );
  return {
    format: 'rarebound-bundle',
    version: 1,
    state,
    analysis,
    run: {
      number: run.number,
      seed: run.seed,
      engineVersion: run.engineVersion,
      startedAt: (job?.startedAt ?? run.createdAt).toISOString(),
      finishedAt: (run.finishedAt as Date).toISOString(),
      by: person?.name ?? null,
    },
    recipe,
    expected: expectationOf(run),
    surveys: surveys.map((survey, position) => ({
      ...pick(survey, ['id', 'slug', 'name', 'description', 'band', 'observedFrom', 'observedTo']),
      position,
      mapSettings: survey.mapSettings,
    })),
    population: { ...pick(population, [...version, 'note']), definition: population.definition },
    sample: sample && { ...pick(sample, version), definition: sample.definition },
    combination: combination && {
      ...pick(combination, version),
      definition: combination.definition,
    },
    ...(run.inputs?.shared && { shared: run.inputs.shared }),
    adopted: { newest: adopted.newest, values },
  };
}

/** What became of the companions since the run read them is no longer its input. */
function refuseChangedCompanions(run: RunRow, companions: CompanionRow[]): void {
  const known = new Map(companions.map((row) => [row.id, row]));
  const used = run.inputs?.companions ?? [];
  const isSame = used.every(({ companionIds, massMjup, semiMajorAxisAu }) => {
    const rows = companionIds.flatMap((id) => known.get(id) ?? []);
    return (
      rows.length === companionIds.length &&
      rows.some((row) => row.status === 'confirmed') &&
      rows.some((row) => row.massMjup === massMjup && row.semiMajorAxisAu === semiMajorAxisAu)
    );
  });
  const usedIds = new Set(used.flatMap(({ companionIds }) => companionIds));
  const starIds = new Set(run.inputs?.stars.map(({ starId }) => starId));
  const later = companions.find(
    (row) =>
      row.status === 'confirmed' &&
      !usedIds.has(row.id) &&
      starIds.has((row as CompanionRow & { target: TargetRow }).target.starId),
  );
  if (isSame && !later) return;
  throw new Conflict(CHANGED);
}

export const CHANGED =
  'The inputs of this run have changed since it was made, so they cannot be kept with it. Run the analysis again';

/**
 * Everything that a finished run rests on, as it stands now.
 *
 * @param state "frozen", or "draft, run 18": said in the recipe
 * @throws Conflict where the tables no longer hold what the run was made from
 */
export async function collectContent(
  run: RunRow,
  state: string,
  analysis: { number: number; name: string },
  transaction: Transaction,
): Promise<BundleContent> {
  const { collaborationId, inputs, result } = run;
  if (!inputs || !result) throw new Conflict('This run has no result: there is nothing to keep');
  const gathered = await gather(run, transaction);
  const { surveys, targets } = gathered;
  const targetIds = targets.map(({ id }) => id);
  const companions = await CompanionRow.findAll({
    where: { targetId: targetIds },
    include: [{ model: TargetRow, as: 'target', attributes: ['starId'] }],
    order: [
      ['foldedName', 'ASC'],
      ['id', 'ASC'],
    ],
    transaction,
  });
  refuseChangedCompanions(run, companions);
  const curves = await ContrastCurveRow.findAll({
    where: { targetId: targetIds, replacedAt: null },
    order: [
      ['digest', 'ASC'],
      ['id', 'ASC'],
    ],
    transaction,
  });
  const stars = await StarRow.findAll({
    where: { collaborationId, id: targets.map(({ starId }) => starId) },
    order: [['foldedName', 'ASC']],
    transaction,
  });
  const maps = await CompletenessMapRow.findAll({
    where: {
      collaborationId,
      origin: 'uploaded',
      id: targets.flatMap(({ mapId, mapState }) => (mapState === 'ready' && mapId ? [mapId] : [])),
    },
    order: [['digest', 'ASC']],
    transaction,
  });
  const tableIds = surveys.flatMap(({ mapSettings: { cooling } }) =>
    cooling.kind === 'built-in' ? [] : [cooling.coolingTableId],
  );
  const tables = await CoolingTableRow.findAll({
    where: { collaborationId, id: tableIds },
    order: [['name', 'ASC']],
    transaction,
  });
  const digestOfMap = new Map(maps.map(({ id, digest }) => [id, digest]));
  const content = {
    recipe: await recipeOf(run, state, gathered, analysis, transaction),
    stars: stars.map((star) => pick(star, ['id', 'name', 'gaiaDr3Id'])),
    targets: targets.map((target) => ({
      ...pick(target, targetFields),
      mapDigest: (target.mapId && digestOfMap.get(target.mapId)) || null,
    })),
    curves: curves.map((curve) => pick(curve, curveFields)),
    companions: companions.map((companion) => pick(companion, companionFields)),
    coolingTables: tables.map((table) =>
      pick(table, ['id', 'name', 'massMjup', 'ageMyr', 'magnitudes', 'digest', 'startCondition']),
    ),
    maps: maps.map((map) => ({
      ...pick(map, [
        ...(['digest', 'engineVersion', 'massMjup', 'semiMajorAxisAu', 'checksum'] as const),
        ...(['inputs', 'report'] as const),
      ]),
      nodeValues: map.nodeValues.toString('base64'),
    })),
    result,
  };
  return JSON.parse(canonicalJson(content)) as BundleContent;
}
