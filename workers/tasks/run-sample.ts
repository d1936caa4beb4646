import type { Transaction } from 'sequelize';
import { InputError } from '@/lib/errors';
import { findEmptySelection, listFirst } from '@/lib/queue/preconditions';
import { refuseUndecided } from '@/lib/queue/undecided-pairs';
import { refuseWithdrawn } from '@/lib/queue/withdrawn-surveys';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { RunInputs } from '@/lib/schemas/runs';
import { CompletenessMapRow, ContrastCurveRow, StarRow, SurveyRow, TargetRow } from '@/models';
import { type AdoptedValues, applyAdopted, loadAdopted } from '@/models/adopted-values';
import { loadRecipe, type MapRecipe } from '@/models/map-recipe';
import { findLeftOut } from '@/models/sample-selection';
import { openCandidates } from '@/models/star-facts';
import { loadCombination, type StoredCombination } from './run-combination';
import { loadSelection, type Selection } from './run-selection';

/** A survey of the run with the recipe of its maps. */
export interface SampleSurvey {
  row: SurveyRow;
  recipe: MapRecipe;
}

/** A star as one survey lists it, with its ready map (its values are read later). */
export interface Entry {
  target: TargetRow;
  survey: SampleSurvey;
  map: CompletenessMapRow;
  curves: ContrastCurveRow[];
}

export interface SampleStar {
  starId: string;
  name: string;
  /** From the first survey, in their order, that gives one [M_Sun]. */
  hostMassMsun: number | null;
  /** By the surveys' order; at least one. */
  entries: Entry[];
}

export interface Sample {
  surveys: SampleSurvey[];
  /** By name: the order of every sum. */
  stars: SampleStar[];
  leftOut: RunInputs['leftOut'];
  /** The selection that the recipe names. */
  selection: Selection['words'] | null;
  /** The stored combination that the recipe names. */
  combination: StoredCombination | null;
  adopted: NonNullable<RunInputs['adopted']>;
}

export type LoadedTarget = TargetRow & { star: StarRow };

async function loadSurveys(
  collaborationId: string,
  surveyIds: string[],
  transaction: Transaction,
): Promise<SampleSurvey[]> {
  const rows = await SurveyRow.findAll({
    where: { collaborationId, id: surveyIds },
    order: [
      ['position', 'ASC'],
      ['id', 'ASC'],
    ],
    transaction,
  });
  if (rows.length !== new Set(surveyIds).size) {
    throw new InputError({
      code: 'no-survey',
      message: 'A survey that the analysis names is not there any more; choose its surveys again',
    });
  }
  await refuseWithdrawn(collaborationId, surveyIds, transaction);
  const surveys: SampleSurvey[] = [];
  for (const row of rows) {
    const recipe = await loadRecipe(collaborationId, row.mapSettings, transaction);
    surveys.push({ row, recipe });
  }
  return surveys;
}

async function loadTargets(surveyIds: string[], adopted: AdoptedValues, transaction: Transaction) {
  const targets = (await TargetRow.findAll({
    where: { surveyId: surveyIds },
    include: [{ model: StarRow, as: 'star' }, openCandidates()],
    transaction,
  })) as LoadedTarget[];
  for (const target of targets) applyAdopted(target, adopted);
  const maps = await CompletenessMapRow.findAll({
    attributes: { exclude: ['nodeValues'] },
    where: { id: targets.flatMap(({ mapId }) => mapId ?? []) },
    transaction,
  });
  const curves = await ContrastCurveRow.findAll({
    where: { targetId: targets.map(({ id }) => id), replacedAt: null },
    order: [['digest', 'ASC']],
    transaction,
  });
  const curvesOf = new Map<string, ContrastCurveRow[]>();
  for (const curve of curves) {
    const list = curvesOf.get(curve.targetId);
    if (list) list.push(curve);
    else curvesOf.set(curve.targetId, [curve]);
  }
  return { targets, mapOf: new Map(maps.map((map) => [map.id, map])), curvesOf };
}

const byName = (a: { name: string }, b: { name: string }) =>
  a.name < b.name ? -1 : a.name > b.name ? 1 : 0;

/**
 * The stars that a run rests on, every star once, and the entries that it leaves out.
 *
 * @throws InputError when no star is left, when a star that should have a map has none, or when two
 *   stars may be one and nobody has decided
 */
export async function collectSample(
  collaborationId: string,
  recipe: Pick<AnalysisRecipe, 'surveyIds' | 'sampleId' | 'combinationId'>,
  transaction: Transaction,
): Promise<Sample> {
  const { surveyIds, sampleId } = recipe;
  const combination = await loadCombination(collaborationId, recipe, transaction);
  const surveys = await loadSurveys(collaborationId, surveyIds, transaction);
  if (combination) {
    const { surveyIds: order } = combination.definition;
    surveys.sort((a, b) => order.indexOf(a.row.id) - order.indexOf(b.row.id));
  }
  const selection = sampleId ? await loadSelection(collaborationId, sampleId, transaction) : null;
  const adopted = await loadAdopted(collaborationId, transaction);
  const loaded = await loadTargets(
    surveys.map(({ row }) => row.id),
    adopted,
    transaction,
  );
  const sample = gatherSample({ surveys, combination, selection, adopted, ...loaded });
  const nameOf = new Map(sample.stars.map(({ starId, name }) => [starId, name]));
  await refuseUndecided(collaborationId, nameOf, transaction);
  return sample;
}

/** Everything that a sample is gathered from, wherever it was read. */
export interface SampleParts {
  /** In the order that counts. */
  surveys: SampleSurvey[];
  combination: StoredCombination | null;
  selection: Selection | null;
  adopted: AdoptedValues;
  /** With their stars and open candidates, adopted values applied. */
  targets: LoadedTarget[];
  mapOf: Map<string, CompletenessMapRow>;
  /** By target; each list by digest. */
  curvesOf: Map<string, ContrastCurveRow[]>;
}

/**
 * The stars of a sample, every star once, and the entries that are left out.
 *
 * @throws InputError when no star is left, or when a star that should have a map has none
 */
export function gatherSample(parts: SampleParts): Sample {
  const { surveys, combination, selection, adopted, targets, mapOf, curvesOf } = parts;
  const ordered = surveys.flatMap(({ row }) =>
    targets.filter(({ surveyId }) => surveyId === row.id).sort(byName),
  );
  const unselected = findLeftOut(
    ordered.filter(({ leftOutReason }) => leftOutReason === null),
    selection?.definition ?? null,
  );
  const leftOut: Sample['leftOut'] = [];
  const withoutMap: string[] = [];
  const stars = new Map<string, SampleStar>();
  for (const survey of surveys) {
    const own = ordered.filter(({ surveyId }) => surveyId === survey.row.id);
    for (const target of own) {
      const curves = curvesOf.get(target.id) ?? [];
      const map = target.mapState === 'ready' && target.mapId ? mapOf.get(target.mapId) : undefined;
      const leaveOut = (reason: string) =>
        leftOut.push({ name: target.name, survey: survey.row.name, reason });
      const unmet = unselected.get(target);
      if (target.leftOutReason !== null) leaveOut(target.leftOutReason);
      else if (unmet) leaveOut(unmet.reason);
      else if (map) addEntry(stars, target.star, { target, survey, map, curves });
      else if (target.mapState === 'none' && curves.length === 0) leaveOut('no curve and no map');
      else withoutMap.push(target.name);
    }
  }
  refuseMissingMaps(withoutMap);
  const nothing = findEmptySelection(stars.size, targets.length);
  if (nothing) throw new InputError(nothing);
  const ofStars = [...stars.values()].sort(byName);
  return {
    surveys,
    stars: ofStars,
    leftOut,
    selection: selection?.words ?? null,
    combination,
    adopted: countAdopted(ofStars, adopted),
  };
}

/** The tables of adopted values, and how many stars of the sample rest on each. */
function countAdopted(stars: SampleStar[], adopted: AdoptedValues): Sample['adopted'] {
  return (['age', 'distance'] as const).flatMap((quantity) => {
    const table = adopted.newest[quantity];
    if (table === null) return [];
    const count = stars.filter(({ starId }) => adopted[quantity].has(starId)).length;
    return [{ quantity, table, stars: count }];
  });
}

function addEntry(stars: Map<string, SampleStar>, star: StarRow, entry: Entry): void {
  const known = stars.get(star.id);
  const { hostMassMsun } = entry.target;
  if (known) {
    known.entries.push(entry);
    known.hostMassMsun ??= hostMassMsun;
    return;
  }
  stars.set(star.id, { starId: star.id, name: star.name, hostMassMsun, entries: [entry] });
}

function refuseMissingMaps(names: string[]): void {
  if (names.length === 0) return;
  const count = names.length === 1 ? '1 star has' : `${names.length} stars have`;
  throw new InputError({
    code: 'no-map',
    message:
      `${count} no completeness map: ${listFirst(names)}. ` +
      'Compute the maps of the survey, or leave these targets out with a reason',
  });
}
