import { InputError } from '@/lib/errors';
import { unionAxis } from '@/lib/numerics/grid';
import { listFirst } from '@/lib/queue/preconditions';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import {
  combineDeepest,
  combineIndependent,
  ENGINE_VERSION,
  encodeMap,
  type MapGrid,
} from '@/lib/sensitivity';
import type { CompletenessMapRow } from '@/models';
import { digestOf } from '@/models/digest';
import { inOrder } from '@/models/engines-of-run';
import { mapOfRow } from '@/models/map-on-grid';
import { mapInputs } from '@/models/map-recipe';
import { buildStarInputs, type OwnCurve } from '@/models/star-inputs';
import type { CompletedMap, CompleteMapsInput } from '../compute/complete-maps';
import { inLanes } from '../lanes';
import type { Work } from '../perform';
import { type MapShelf, tableShelf } from './map-shelf';
import type { MapToStore } from './map-store';
import type { Entry, Sample, SampleStar } from './run-sample';

export type Rule = 'same-position' | 'deepest' | 'independent';

/** Digest of a star's map in this run: its own, or the one combined from its entries. */
export type MapDigests = Map<string, string>;

/** A run on more nodes an axis costs time and memory; its limits would not move. */
const MOST_NODES = 256;

/** Grids by their nodes: the maps of a survey share one. */
function gridsOf(maps: MapGrid[]): MapGrid[] {
  const known = new Map<string, MapGrid>();
  for (const { massMjup, semiMajorAxisAu } of maps) {
    known.set(`${massMjup.join()} ${semiMajorAxisAu.join()}`, { massMjup, semiMajorAxisAu });
  }
  return [...known.values()];
}

/**
 * The grid of a run: the nodes of all its maps together, on which each is itself, bilinear between
 * its own nodes. Where those are too many, the grid of the survey with the most.
 */
export function commonGrid(sample: Sample): MapGrid {
  const choice = sample.combination?.definition.grid;
  const chosen = choice?.choice === 'survey' && choice.surveyId;
  const survey = sample.surveys.find(({ row }) => row.id === chosen);
  if (survey) return survey.recipe.grid;
  const grids = gridsOf(
    sample.stars.flatMap(({ entries }) =>
      entries.map(({ map }) => ({
        massMjup: Float64Array.from(map.massMjup),
        semiMajorAxisAu: Float64Array.from(map.semiMajorAxisAu),
      })),
    ),
  );
  const united = {
    massMjup: unionAxis(grids.map(({ massMjup }) => massMjup)),
    semiMajorAxisAu: unionAxis(grids.map(({ semiMajorAxisAu }) => semiMajorAxisAu)),
  };
  if (Math.max(united.massMjup.length, united.semiMajorAxisAu.length) <= MOST_NODES) return united;
  const nodes = ({ massMjup, semiMajorAxisAu }: MapGrid) =>
    massMjup.length * semiMajorAxisAu.length;
  return sample.surveys
    .map(({ recipe }) => recipe.grid)
    .reduce((most, one) => (nodes(one) > nodes(most) ? one : most));
}

const hasCurve = (entry: Entry) => entry.curves.length > 0 && entry.map.origin === 'computed';
const recipeDigest = ({ survey: { recipe } }: Entry) =>
  digestOf({ cooling: recipe.coolingDigest, settings: recipe.settings });
const isOneRecipe = (entries: Entry[]) =>
  entries.every((entry) => recipeDigest(entry) === recipeDigest(entries[0]));

function refuse(code: string, stars: SampleStar[], words: string): void {
  if (stars.length === 0) return;
  const names = listFirst(stars.map(({ name }) => name));
  throw new InputError({ code, message: `${words}: ${names}` });
}

/** The rule for one star; explicit rules that a star cannot follow are refused before. */
export function ruleFor({ entries }: SampleStar, asked: AnalysisRecipe['combination']): Rule {
  if (asked === 'deepest' || asked === 'independent' || asked === 'same-position') return asked;
  return entries.every(hasCurve) && isOneRecipe(entries) ? 'same-position' : 'deepest';
}

type RuleOfStar = (star: SampleStar) => Rule | undefined;

/** Stars that a stored combination gives a rule of their own; none where another rule is tried. */
function ownRules({ combination }: Sample, asked: AnalysisRecipe['combination']): RuleOfStar {
  if (!combination || combination.definition.rule !== asked) return () => undefined;
  const rules = new Map(combination.definition.starRules.map(({ starId, rule }) => [starId, rule]));
  return ({ starId }) => rules.get(starId);
}

function checkRule(
  shared: SampleStar[],
  asked: AnalysisRecipe['combination'],
  ownRule: RuleOfStar,
): void {
  if (asked === 'refuse') {
    refuse('shared-stars', shared, 'Stars in several surveys, which this analysis refuses');
  }
  const asking = shared.filter((star) => (ownRule(star) ?? asked) === 'same-position');
  refuse(
    'no-curve',
    asking.filter(({ entries }) => !entries.every(hasCurve)),
    'The rule "same position" needs a contrast curve in every survey; missing for',
  );
  refuse(
    'map-settings',
    asking.filter(({ entries }) => !isOneRecipe(entries)),
    'The rule "same position" needs equal map settings in all surveys; they differ for',
  );
}

/** Versions of the engine behind the computed maps of a sample, the oldest first. */
export function enginesOfMaps(sample: Sample, asked: AnalysisRecipe['combination']): string[] {
  const ownRule = ownRules(sample, asked);
  const isJoint = (star: SampleStar) =>
    star.entries.length > 1 && (ownRule(star) ?? ruleFor(star, asked)) === 'same-position';
  const engines = sample.stars.flatMap((star) =>
    isJoint(star)
      ? [ENGINE_VERSION]
      : star.entries
          .filter(({ map }) => map.origin === 'computed')
          .map(({ map }) => map.engineVersion),
  );
  return inOrder(engines);
}

interface Combination {
  star: SampleStar;
  digest: string;
  inputs: Record<string, unknown>;
  rule: Rule;
}

function planCombination(star: SampleStar, rule: Rule, grid: MapGrid): Combination {
  const { entries } = star;
  const { recipe } = entries[0].survey;
  const inputs =
    rule === 'same-position'
      ? {
          ...mapInputs(jointInputs(star), ownCurves(star), { ...recipe, grid }),
          kind: 'combined',
          rule,
        }
      : {
          kind: 'combined',
          rule,
          engineVersion: ENGINE_VERSION,
          maps: entries.map(({ map }) => map.digest).sort(),
        };
  return { star, digest: digestOf(inputs), inputs: { ...inputs, star: star.name }, rule };
}

/** Curves of all entries; one that two surveys list to the last digit is one observation. */
export function ownCurves({ entries }: Pick<SampleStar, 'entries'>): OwnCurve[] {
  const own = new Map<string, OwnCurve>();
  for (const { target, curves } of entries) {
    for (const curve of curves) {
      if (!own.has(curve.digest)) own.set(curve.digest, { target, curve });
    }
  }
  return [...own.values()];
}
export const jointInputs = (star: SampleStar) =>
  buildStarInputs(star.entries[0].target, ownCurves(star));

/**
 * Sees to it that every star has one map: stars in several surveys get a combined one, which is
 * stored like any other and found again by its digest.
 *
 * @throws InputError where a star cannot follow the rule that was asked for
 */
export async function combineMaps(
  work: Work,
  sample: Sample,
  asked: AnalysisRecipe['combination'],
  grid: MapGrid,
  onProgress: (done: number, total: number) => Promise<void>,
  shelf: MapShelf = tableShelf(work),
): Promise<MapDigests> {
  const digests: MapDigests = new Map(
    sample.stars.map(({ starId, entries: [{ map }] }) => [starId, map.digest]),
  );
  const shared = sample.stars.filter(({ entries }) => entries.length > 1);
  const ownRule = ownRules(sample, asked);
  checkRule(shared, asked, ownRule);
  const plans = shared.map((star) =>
    planCombination(star, ownRule(star) ?? ruleFor(star, asked), grid),
  );
  for (const { star, digest } of plans) digests.set(star.starId, digest);
  const known = await shelf.known(plans.map(({ digest }) => digest));
  const missing = plans.filter(({ digest }) => !known.has(digest));
  let done = plans.length - missing.length;
  await onProgress(done, plans.length);
  await inLanes(missing, work.pool.threads + 1, async (plan) => {
    const map = await (plan.rule === 'same-position'
      ? jointMap(work, plan, grid)
      : combinedMap(plan, shelf));
    await shelf.keep(map);
    done++;
    await onProgress(done, plans.length);
  });
  return digests;
}

async function jointMap(work: Work, plan: Combination, grid: MapGrid): Promise<MapToStore> {
  const { star, digest, inputs } = plan;
  const { cooling, settings } = star.entries[0].survey.recipe;
  const [answer] = await work.pool.run<CompleteMapsInput, CompletedMap[]>(
    'complete-maps',
    { stars: [jointInputs(star)], cooling, grid, settings },
    { signal: work.signal },
  );
  if ('fault' in answer) {
    throw new InputError({ code: 'no-map', message: `${star.name}: ${answer.fault}` });
  }
  return { ...grid, digest, inputs, ...answer };
}

async function combinedMap(
  { star, digest, inputs, rule }: Combination,
  shelf: MapShelf,
): Promise<MapToStore> {
  const rows = await shelf.read(star.entries.map(({ map }) => map.digest));
  rows.sort((a, b) => (a.digest < b.digest ? -1 : a.digest > b.digest ? 1 : 0));
  return { ...combineRows(rows, rule), digest, inputs };
}

/** Maps of one star put together by a rule that needs no curves, on the union of their nodes. */
export function combineRows(rows: CompletenessMapRow[], rule: Rule) {
  const maps = rows.map(mapOfRow);
  const combined = rule === 'deepest' ? combineDeepest(maps) : combineIndependent(maps);
  const flagged = new Set(rows.flatMap(flaggedMasses));
  const flaggedMassNodes = [...combined.massMjup.keys()].filter((i) =>
    flagged.has(combined.massMjup[i]),
  );
  const { massMjup, semiMajorAxisAu, completeness } = combined;
  const encoded = encodeMap(completeness);
  return { massMjup, semiMajorAxisAu, encoded, report: { flaggedMassNodes } };
}

/** Masses at which a map rests on the edge of its cooling relation or beyond it. */
export function flaggedMasses(map: {
  report: Record<string, unknown>;
  massMjup: ArrayLike<number>;
}): number[] {
  const { flaggedMassNodes } = map.report;
  return Array.isArray(flaggedMassNodes) ? flaggedMassNodes.map((i) => map.massMjup[i]) : [];
}
