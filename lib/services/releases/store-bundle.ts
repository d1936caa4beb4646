import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { Conflict } from '@/lib/errors';
import type { BundleContent } from '@/lib/schemas/bundles';
import { ENGINE_VERSION } from '@/lib/sensitivity';
import {
  AdoptedValueRow,
  AnalysisRow,
  CombinationRow,
  CompanionRow,
  CompletenessMapRow,
  ContrastCurveRow,
  CoolingTableRow,
  PopulationRow,
  SampleRow,
  StarRow,
  SurveyRow,
  TargetRow,
  ValueTableRow,
} from '@/models';
import { rowsOfBundle } from '@/models/bundle-rows';

type Numbered = typeof PopulationRow | typeof SampleRow | typeof CombinationRow;

/** The bundle's own number where it is free, so that a statement that names it stays as it was. */
async function freeNumber(
  model: Numbered | typeof AnalysisRow,
  collaborationId: string,
  wanted: number,
  transaction: Transaction,
): Promise<number> {
  const table = model as typeof AnalysisRow;
  const taken = await table.count({ where: { collaborationId, number: wanted }, transaction });
  if (taken === 0) return wanted;
  const last = await table.max<number, AnalysisRow>('number', {
    where: { collaborationId },
    transaction,
  });
  return (last ?? 0) + 1;
}

async function storeVersions(
  actor: Actor,
  { recipe }: BundleContent,
  transaction: Transaction,
): Promise<void> {
  const { collaborationId, personId: createdBy } = actor;
  const number = (model: Numbered, wanted: number) =>
    freeNumber(model, collaborationId, wanted, transaction);
  const owned = { collaborationId, createdBy };
  const { population, sample, combination } = recipe;
  await PopulationRow.create(
    {
      ...population,
      definition: population.definition as PopulationRow['definition'],
      ...owned,
      isShared: true,
      number: await number(PopulationRow, population.number),
    },
    { transaction },
  );
  if (sample) {
    await SampleRow.create(
      { ...sample, ...owned, number: await number(SampleRow, sample.number) },
      { transaction },
    );
  }
  if (combination) {
    await CombinationRow.create(
      { ...combination, ...owned, number: await number(CombinationRow, combination.number) },
      { transaction },
    );
  }
}

/** Tables of adopted values, under the numbers that the run's conditions name. */
async function storeAdopted(
  actor: Actor,
  { recipe }: BundleContent,
  transaction: Transaction,
): Promise<void> {
  const { collaborationId, personId: createdBy } = actor;
  const { newest, values } = recipe.adopted;
  for (const quantity of ['age', 'distance'] as const) {
    if (newest[quantity] === null) continue;
    const known = await ValueTableRow.count({ where: { collaborationId, quantity }, transaction });
    if (known > 0) {
      throw new Conflict(
        `This collaboration has adopted ${quantity}s of its own, and the bundle brings others. Bring it into a collaboration of its own`,
      );
    }
    const own = values.filter((value) => value.quantity === quantity);
    const numbers = new Set([newest[quantity], ...own.map(({ table }) => table)]);
    for (const number of [...numbers].sort((a, b) => a - b)) {
      const why = 'came with a bundle';
      const table = await ValueTableRow.create(
        { collaborationId, quantity, number, why, createdBy },
        { transaction },
      );
      await AdoptedValueRow.bulkCreate(
        own
          .filter(({ table: its }) => its === number)
          .map(({ starId, value, source }) => ({
            tableId: table.id,
            collaborationId,
            starId,
            value: value as never,
            source,
          })),
        { transaction },
      );
    }
  }
}

const plain = <Row extends { dataValues: object }>(rows: Row[]): Row['dataValues'][] =>
  rows.map(({ dataValues }) => dataValues);

/**
 * Stores everything of a bundle but its run.
 *
 * @param refuse is given the names of its stars, and throws where something of it is here already
 */
export async function storeBundle(
  actor: Actor,
  content: BundleContent,
  refuse: (foldedNames: string[]) => Promise<void>,
  transaction: Transaction,
): Promise<{ analysis: AnalysisRow; engineVersion: string }> {
  const { collaborationId, personId } = actor;
  const { recipe, coolingTables } = content;
  const rows = rowsOfBundle(content, collaborationId);
  await refuse(rows.stars.map(({ foldedName }) => foldedName));
  await CoolingTableRow.bulkCreate(
    coolingTables.map((table) => ({ ...table, collaborationId })),
    { transaction },
  );
  const last = await SurveyRow.max<number, SurveyRow>('position', {
    where: { collaborationId },
    transaction,
  });
  await SurveyRow.bulkCreate(
    recipe.surveys.map((survey) => ({
      ...survey,
      position: (last ?? -1) + 1 + survey.position,
      collaborationId,
      leadId: personId,
    })),
    { transaction },
  );
  await CompletenessMapRow.bulkCreate(plain(rows.maps), { ignoreDuplicates: true, transaction });
  const stored = await CompletenessMapRow.findAll({
    attributes: ['id', 'digest'],
    where: { collaborationId, digest: rows.maps.map(({ digest }) => digest) },
    transaction,
  });
  const idOf = new Map(stored.map(({ id, digest }) => [digest, id]));
  const ownMaps = new Map(rows.maps.map(({ id, digest }) => [id, digest]));
  await StarRow.bulkCreate(plain(rows.stars), { transaction });
  await TargetRow.bulkCreate(
    plain(rows.targets).map((target) => ({
      ...target,
      mapId: (target.mapId && idOf.get(ownMaps.get(target.mapId) ?? '')) || null,
    })),
    { transaction },
  );
  await ContrastCurveRow.bulkCreate(plain(rows.curves), { transaction });
  await CompanionRow.bulkCreate(plain(rows.companions), { transaction });
  await storeVersions(actor, content, transaction);
  await storeAdopted(actor, content, transaction);
  const { analysis: asked } = recipe;
  const analysis = await AnalysisRow.create(
    {
      collaborationId,
      number: await freeNumber(AnalysisRow, collaborationId, asked.number, transaction),
      name: asked.name,
      recipe: recipe.recipe,
      createdBy: personId,
    },
    { transaction },
  );
  return { analysis, engineVersion: ENGINE_VERSION };
}
