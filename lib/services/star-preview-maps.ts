import type { Transaction } from 'sequelize';
import type { RunInputs } from '@/lib/schemas/runs';
import {
  type CompletenessMap,
  combineDeepest,
  combineIndependent,
  computeCompletenessMap,
  type MapGrid,
  regridNodes,
} from '@/lib/sensitivity';
import { CompletenessMapRow, ContrastCurveRow, SurveyRow, TargetRow } from '@/models';
import { type AdoptedValues, applyAdopted } from '@/models/adopted-values';
import { mapOfRow } from '@/models/map-on-grid';
import { loadRecipe, type MapRecipe } from '@/models/map-recipe';
import { openCandidates } from '@/models/star-facts';
import { buildStarInputs } from '@/models/star-inputs';

interface Entry {
  target: TargetRow;
  curves: ContrastCurveRow[];
  recipe: MapRecipe;
}

/** What a run's star is mapped from. */
export interface MappedStar {
  entries: Entry[];
  /** How the run combined them. */
  rule: string | null;
}

/** The entries of a run's star by now under adopted values, in the order of the run's surveys. */
export async function readMappedStar(
  run: { collaborationId: string; inputs: RunInputs },
  star: RunInputs['stars'][number],
  currentId: string,
  adopted: AdoptedValues,
  transaction: Transaction,
): Promise<MappedStar> {
  const { collaborationId } = run;
  const rows = await TargetRow.findAll({
    where: { collaborationId, starId: currentId, surveyId: star.surveys },
    include: [openCandidates()],
    transaction,
  });
  const surveys = await SurveyRow.findAll({ where: { id: star.surveys }, transaction });
  const entries: Entry[] = [];
  for (const surveyId of star.surveys) {
    const target = rows.find((row) => row.surveyId === surveyId);
    const survey = surveys.find(({ id }) => id === surveyId);
    if (!target || !survey) continue;
    applyAdopted(target, adopted);
    const curves = await ContrastCurveRow.findAll({
      where: { targetId: target.id, replacedAt: null },
      order: [['digest', 'ASC']],
      transaction,
    });
    const recipe = await loadRecipe(collaborationId, survey.mapSettings, transaction);
    entries.push({ target, curves, recipe });
  }
  const map = await CompletenessMapRow.findByPk(star.mapId, {
    attributes: ['inputs'],
    transaction,
  });
  const rule = star.surveys.length > 1 ? (map?.inputs.rule as string | undefined) : undefined;
  return { entries, rule: rule ?? null };
}

const compute = (entry: Entry, curves: Entry['curves'], grid: MapGrid): CompletenessMap => {
  const star = buildStarInputs(
    entry.target,
    curves.map((curve) => ({ target: entry.target, curve })),
  );
  return computeCompletenessMap(star, entry.recipe.cooling, grid, entry.recipe.settings).map;
};

async function storedMap({ target }: Entry, transaction: Transaction): Promise<CompletenessMap> {
  const row = await CompletenessMapRow.findByPk(target.mapId ?? '', {
    transaction,
    rejectOnEmpty: true,
  });
  return mapOfRow(row);
}

/**
 * The map of a star on a run's grid, by the engine that the worker uses.
 *
 * @throws MissingInput where the values leave something out, RangeError where the engine refuses it
 */
export async function mapUnder(
  { entries, rule }: MappedStar,
  grid: MapGrid,
  transaction: Transaction,
): Promise<Float64Array> {
  if (rule === 'same-position') {
    const own = new Map<string, { target: TargetRow; curve: ContrastCurveRow }>();
    for (const { target, curves } of entries) {
      for (const curve of curves) {
        if (!own.has(curve.digest)) own.set(curve.digest, { target, curve });
      }
    }
    const [{ target, recipe }] = entries;
    const star = buildStarInputs(target, [...own.values()]);
    return computeCompletenessMap(star, recipe.cooling, grid, recipe.settings).map.completeness;
  }
  const maps: CompletenessMap[] = [];
  for (const entry of entries) {
    maps.push(
      entry.curves.length === 0
        ? await storedMap(entry, transaction)
        : compute(entry, entry.curves, entry.recipe.grid),
    );
  }
  const combine = rule === 'independent' ? combineIndependent : combineDeepest;
  const map = maps.length === 1 ? maps[0] : combine(maps);
  return regridNodes(map, grid).map.completeness;
}
