import { Op } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { logSpacedAxis } from '@/lib/numerics/grid';
import { populationWeights } from '@/lib/population';
import { describeStoredCombination } from '@/lib/schemas/combination-words';
import type {
  CombinationDefinition,
  CombinationPreview,
  StarRule,
} from '@/lib/schemas/combinations';
import {
  type CompletenessMap,
  combineDeepest,
  combineIndependent,
  type MapGrid,
  regridNodes,
} from '@/lib/sensitivity';
import { CompletenessMapRow, ContrastCurveRow, StarRow, SurveyRow, TargetRow } from '@/models';
import { canonicalJson } from '@/models/digest';
import { mapOfRow } from '@/models/map-on-grid';
import { wasChosenForCompanion } from '@/models/sample-selection';
import { checkCombination } from './combinations';
import { currentYardstick, summariseMaps } from './survey-depth';

interface Entry {
  survey: SurveyRow;
  target: TargetRow;
  isComputed: boolean;
}

/** The surveys in the order of the combination, and what they list and may count. */
async function loadEntries(actor: Actor, { surveyIds }: CombinationDefinition) {
  const rows = await SurveyRow.findAll({
    where: { id: surveyIds, collaborationId: actor.collaborationId },
  });
  const surveys = surveyIds.flatMap((id) => rows.find((row) => row.id === id) ?? []);
  const targets = await TargetRow.findAll({
    where: { surveyId: surveyIds, leftOutReason: { [Op.is]: null } },
    order: [['foldedName', 'ASC']],
  });
  const counted = targets.filter((target) => !wasChosenForCompanion(target));
  const curves = await ContrastCurveRow.findAll({
    attributes: ['targetId'],
    where: { targetId: counted.map(({ id }) => id), replacedAt: null },
  });
  const maps = await CompletenessMapRow.findAll({
    attributes: ['id', 'origin'],
    where: { id: counted.flatMap(({ mapId }) => mapId ?? []) },
  });
  const originOf = new Map(maps.map(({ id, origin }) => [id, origin]));
  const withCurve = new Set(curves.map(({ targetId }) => targetId));
  const entries = surveys.flatMap((survey) =>
    counted
      .filter(({ surveyId }) => surveyId === survey.id)
      .map((target): Entry => {
        const isComputed =
          withCurve.has(target.id) && originOf.get(target.mapId ?? '') === 'computed';
        return { survey, target, isComputed };
      }),
  );
  return { surveys, entries };
}

/** What a combination holds: its overlaps, each star's rule, and what each survey adds. */
export async function previewCombination(
  actor: Actor,
  { definition }: { definition: CombinationDefinition },
): Promise<CombinationPreview> {
  demand(actor, 'read');
  await checkCombination(actor, definition);
  const { surveys, entries } = await loadEntries(actor, definition);
  const entriesOf = new Map<string, Entry[]>();
  for (const entry of entries) {
    const list = entriesOf.get(entry.target.starId);
    if (list) list.push(entry);
    else entriesOf.set(entry.target.starId, [entry]);
  }
  const sharedIds = [...entriesOf].flatMap(([id, list]) => (list.length > 1 ? [id] : []));
  const stars = await StarRow.findAll({ where: { id: sharedIds }, order: [['name', 'ASC']] });
  const shared = stars.map(({ id, name }) => {
    const own = entriesOf.get(id) as Entry[];
    const canSamePosition = own.every(({ isComputed }) => isComputed) && haveOneRecipe(own);
    const surveyIds = own.map(({ survey }) => survey.id);
    const rule = ruleOf(definition, id, canSamePosition);
    return { starId: id, name, surveyIds, canSamePosition, rule };
  });
  const ruleOfStar = new Map(shared.map(({ starId, rule }) => [starId, rule]));
  const { adds, semiMajorAxisAu } = await sumUp(actor, surveys, entriesOf, ruleOfStar);
  const names = new Map(surveys.map(({ id, name }) => [id, name]));
  return {
    words: describeStoredCombination(definition, (id) => names.get(id) ?? 'a deleted survey'),
    stars: entriesOf.size,
    entries: entries.length,
    surveys: surveys.map((survey, place) => {
      const own = entries.filter((entry) => entry.survey === survey);
      const isNew = (entry: Entry) => entriesOf.get(entry.target.starId)?.[0] === entry;
      return {
        id: survey.id,
        name: survey.name,
        position: survey.position,
        entries: own.length,
        newStars: own.filter(isNew).length,
        withoutMap: own.filter(({ target }) => target.mapState !== 'ready').length,
        adds: [...adds[place]],
      };
    }),
    semiMajorAxisAu: [...semiMajorAxisAu],
    shared,
  };
}

/** Grids may differ; everything else that makes a curve a map may not. */
function haveOneRecipe(entries: Entry[]): boolean {
  const rules = entries.map(({ survey: { mapSettings } }) => {
    const { massMjup: _mass, semiMajorAxisAu: _axis, ...rest } = mapSettings;
    return canonicalJson(rest);
  });
  return rules.every((rule) => rule === rules[0]);
}

function ruleOf(
  { rule, starRules }: CombinationDefinition,
  starId: string,
  canSamePosition: boolean,
): StarRule {
  const own = starRules.find((star) => star.starId === starId)?.rule;
  if (own) return own;
  if (rule === 'default' || rule === 'refuse') return canSamePosition ? 'same-position' : 'deepest';
  return rule;
}

/**
 * What each survey adds to the sum over stars of completeness averaged over mass. A shared star's
 * maps are put together as they come; "same position" would need its curves, so the deepest map,
 * which is never more, stands for it.
 *
 * @returns adds: shape [survey][semiMajorAxis], stars
 */
async function sumUp(
  actor: Actor,
  surveys: SurveyRow[],
  entriesOf: Map<string, Entry[]>,
  ruleOfStar: Map<string, StarRule>,
) {
  const { massMjup: mass, semiMajorAxisAu: axis } = surveys[0].mapSettings;
  const grid: MapGrid = {
    massMjup: logSpacedAxis(mass.min, mass.max, mass.count),
    semiMajorAxisAu: logSpacedAxis(axis.min, axis.max, axis.count),
  };
  const yardstick = await currentYardstick(actor.collaborationId);
  const weights = populationWeights(grid, yardstick.population).mass;
  const adds = surveys.map(() => new Float64Array(grid.semiMajorAxisAu.length));
  const place = new Map(surveys.map(({ id }, i) => [id, i]));
  const add = (surveyId: string, profile: Float64Array, before?: Float64Array) => {
    const sum = adds[place.get(surveyId) as number];
    profile.forEach((value, j) => {
      sum[j] += value - (before?.[j] ?? 0);
    });
  };
  const ready = [...entriesOf.values()].map((list) =>
    list.filter(({ target }) => target.mapState === 'ready' && target.mapId !== null),
  );
  const alone = ready.flatMap((list) => (list.length === 1 ? list : []));
  const ids = alone.map(({ target }) => target.mapId as string);
  const summaries = await summariseMaps(actor.collaborationId, ids, yardstick, grid);
  for (const { survey, target } of alone) {
    const summary = summaries.get(target.mapId as string);
    if (summary) add(survey.id, summary.profile);
  }
  for (const list of ready) {
    if (list.length < 2) continue;
    const rows = await CompletenessMapRow.findAll({
      where: { id: list.map(({ target }) => target.mapId as string) },
    });
    const maps = list.flatMap(({ target }) => {
      const row = rows.find(({ id }) => id === target.mapId);
      return row ? [mapOfRow(row)] : [];
    });
    const isIndependent = ruleOfStar.get(list[0].target.starId) === 'independent';
    const combine = isIndependent ? combineIndependent : combineDeepest;
    let before: Float64Array | undefined;
    list.forEach(({ survey }, i) => {
      const together = i === 0 ? maps[0] : combine(maps.slice(0, i + 1));
      const profile = profileOf(together, grid, weights);
      add(survey.id, profile, before);
      before = profile;
    });
  }
  return { adds, semiMajorAxisAu: grid.semiMajorAxisAu };
}

function profileOf(map: CompletenessMap, grid: MapGrid, weights: Float64Array): Float64Array {
  const { completeness } = regridNodes(map, grid).map;
  const columns = grid.semiMajorAxisAu.length;
  const profile = new Float64Array(columns);
  weights.forEach((weight, i) => {
    for (let j = 0; j < columns; j++) profile[j] += weight * completeness[i * columns + j];
  });
  return profile;
}
