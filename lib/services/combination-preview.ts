import { Op } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { describeStoredCombination } from '@/lib/schemas/combination-words';
import type {
  CombinationDefinition,
  CombinationPreview,
  StarRule,
} from '@/lib/schemas/combinations';
import type { MapSettings } from '@/lib/schemas/surveys';
import { CompletenessMapRow, ContrastCurveRow, StarRow, SurveyRow, TargetRow } from '@/models';
import { canonicalJson } from '@/models/digest';
import { wasChosenForCompanion } from '@/models/sample-selection';
import { checkCombination } from './combinations';
import {
  currentYardstick,
  gridOfSettings,
  type MapsTogether,
  summariseTogether,
  type Yardstick,
} from './survey-depth';
import { together } from './together';

type Entry = Pick<TargetRow, 'id' | 'surveyId' | 'starId' | 'mapId' | 'mapState' | 'attributes'> & {
  isComputed: boolean;
};

/** The surveys in the order of the combination, and what they list and may count. */
async function loadEntries(actor: Actor, { surveyIds }: CombinationDefinition) {
  const rows = await SurveyRow.findAll({
    where: { id: surveyIds, collaborationId: actor.collaborationId },
  });
  const surveys = surveyIds.flatMap((id) => rows.find((row) => row.id === id) ?? []);
  const targets: Omit<Entry, 'isComputed'>[] = await TargetRow.findAll({
    attributes: ['id', 'surveyId', 'starId', 'mapId', 'mapState', 'attributes'],
    where: { surveyId: surveyIds, leftOutReason: { [Op.is]: null } },
    order: [['foldedName', 'ASC']],
    raw: true,
  });
  const counted = targets.filter((target) => !wasChosenForCompanion(target));
  const [curves, maps] = await Promise.all([
    ContrastCurveRow.findAll({
      attributes: ['targetId'],
      where: { targetId: counted.map(({ id }) => id), replacedAt: null },
      raw: true,
    }),
    CompletenessMapRow.findAll({
      attributes: ['id', 'origin'],
      where: { id: counted.flatMap(({ mapId }) => mapId ?? []) },
      raw: true,
    }),
  ]);
  const originOf = new Map(maps.map(({ id, origin }) => [id, origin]));
  const withCurve = new Set(curves.map(({ targetId }) => targetId));
  const ofSurvey = new Map<string, Entry[]>(surveys.map(({ id }) => [id, []]));
  for (const target of counted) {
    const isComputed = withCurve.has(target.id) && originOf.get(target.mapId ?? '') === 'computed';
    ofSurvey.get(target.surveyId)?.push({ ...target, isComputed });
  }
  return { surveys, entries: [...ofSurvey.values()].flat(), ofSurvey };
}

/** What a combination holds: its overlaps, each star's rule, and what each survey adds. */
export async function previewCombination(
  actor: Actor,
  { definition }: { definition: CombinationDefinition },
): Promise<CombinationPreview> {
  demand(actor, 'read');
  await checkCombination(actor, definition);
  return together(`combination ${actor.collaborationId} ${canonicalJson(definition)}`, () =>
    readPreview(actor, definition),
  );
}

async function readPreview(
  actor: Actor,
  definition: CombinationDefinition,
): Promise<CombinationPreview> {
  const { surveys, entries, ofSurvey } = await loadEntries(actor, definition);
  const entriesOf = new Map<string, Entry[]>();
  for (const entry of entries) {
    const list = entriesOf.get(entry.starId);
    if (list) list.push(entry);
    else entriesOf.set(entry.starId, [entry]);
  }
  const settingsOf = new Map(surveys.map(({ id, mapSettings }) => [id, mapSettings]));
  const sharedIds = [...entriesOf].flatMap(([id, list]) => (list.length > 1 ? [id] : []));
  const stars = await StarRow.findAll({
    attributes: ['id', 'name'],
    where: { id: sharedIds },
    order: [['name', 'ASC']],
    raw: true,
  });
  const shared = stars.map(({ id, name }) => {
    const own = entriesOf.get(id) as Entry[];
    const canSamePosition =
      own.every(({ isComputed }) => isComputed) && haveOneRecipe(own, settingsOf);
    const surveyIds = own.map(({ surveyId }) => surveyId);
    const rule = ruleOf(definition, id, canSamePosition);
    return { starId: id, name, surveyIds, canSamePosition, rule };
  });
  const ruleOfStar = new Map(shared.map(({ starId, rule }) => [starId, rule]));
  const yardstick = await currentYardstick(actor.collaborationId);
  const { adds, semiMajorAxisAu } = await sumUp(yardstick, surveys, entriesOf, ruleOfStar);
  const names = new Map(surveys.map(({ id, name }) => [id, name]));
  return {
    words: describeStoredCombination(definition, (id) => names.get(id) ?? 'a deleted survey'),
    stars: entriesOf.size,
    entries: entries.length,
    surveys: surveys.map((survey, place) => {
      const own = ofSurvey.get(survey.id) as Entry[];
      const isNew = (entry: Entry) => entriesOf.get(entry.starId)?.[0] === entry;
      return {
        id: survey.id,
        name: survey.name,
        position: survey.position,
        entries: own.length,
        newStars: own.filter(isNew).length,
        withoutMap: own.filter(({ mapState }) => mapState !== 'ready').length,
        adds: [...adds[place]],
      };
    }),
    semiMajorAxisAu: [...semiMajorAxisAu],
    yardstick: yardstick.view,
    shared,
  };
}

/** Grids may differ; everything else that makes a curve a map may not. */
function haveOneRecipe(entries: Entry[], settingsOf: Map<string, MapSettings>): boolean {
  const rules = entries.map(({ surveyId }) => {
    const {
      massMjup: _mass,
      semiMajorAxisAu: _axis,
      ...rest
    } = settingsOf.get(surveyId) as MapSettings;
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
  yardstick: Yardstick,
  surveys: SurveyRow[],
  entriesOf: Map<string, Entry[]>,
  ruleOfStar: Map<string, StarRule>,
) {
  const grid = gridOfSettings(surveys[0].mapSettings);
  const adds = surveys.map(() => new Float64Array(grid.semiMajorAxisAu.length));
  const place = new Map(surveys.map(({ id }, i) => [id, i]));
  const steps = [...entriesOf].flatMap(([starId, list]) => {
    const ready = list.filter(({ mapState, mapId }) => mapState === 'ready' && mapId !== null);
    const mapIds = ready.map(({ mapId }) => mapId as string);
    const rule = ruleOfStar.get(starId) === 'independent' ? 'independent' : 'deepest';
    return ready.map(({ surveyId }, i) => {
      const together: MapsTogether = { mapIds: mapIds.slice(0, i + 1), rule };
      return { surveyId, together, isFirst: i === 0 };
    });
  });
  const summaries = await summariseTogether(
    surveys[0].collaborationId,
    steps.map(({ together }) => together),
    yardstick,
    grid,
  );
  steps.forEach(({ surveyId, isFirst }, i) => {
    const profile = summaries[i]?.profile;
    const before = isFirst ? undefined : summaries[i - 1]?.profile;
    const sum = adds[place.get(surveyId) as number];
    profile?.forEach((value, j) => {
      sum[j] += value - (before?.[j] ?? 0);
    });
  });
  return { adds, semiMajorAxisAu: grid.semiMajorAxisAu };
}
