import type { MapSettings } from '@/lib/schemas/sensitivity';
import { ENGINE_VERSION, type StarInputs } from '@/lib/sensitivity';
import { digestOf } from '@/models/digest';
import { loadRecipe, type MapRecipe, mapInputs } from '@/models/map-recipe';
import { buildStarInputs, type OwnCurve } from '@/models/star-inputs';
import { jointInputs, ownCurves, ruleFor } from './run-maps';
import type { Entry, Sample, SampleStar } from './run-sample';
import type { StudyWork } from './study-context';
import { ensureCombinations, ensureMaps, type NewCombination, type NewMap } from './study-maps';

/** One assumption of all maps changed: what was measured of a star, or how its curves become a map. */
export interface Variation {
  /** Name of the change in the study's inputs. */
  name: string;
  star?: (star: StarInputs) => StarInputs;
  settings?: (settings: MapSettings) => MapSettings;
}

/** Every survey under one cooling model; null: the built-in law. */
export const underCooling =
  (coolingTableId: string | null): Variation['settings'] =>
  (settings) => ({
    ...settings,
    cooling: coolingTableId === null ? { kind: 'built-in' } : { kind: 'table', coolingTableId },
  });

export interface VariedMaps {
  /** One digest a star, in the run's order. */
  digests: string[];
  /** Stars whose map the change leaves as it was: uploaded ones, and those that it does not concern. */
  starsUnchanged: number;
  /** Why a map could not be made; the first, by star. */
  fault: string | null;
}

interface Planned {
  digest: string;
  maps: NewMap[];
  combination: NewCombination | null;
}

/** A curve's digest stands for its stored values: where a change moved them, it is told beside. */
function variedInputs(
  before: StarInputs,
  star: StarInputs,
  curves: OwnCurve[],
  recipe: MapRecipe,
): Record<string, unknown> {
  const inputs = mapInputs(star, curves, recipe);
  const isMoved = star.curves.some((curve, i) => curve !== before.curves[i]);
  return isMoved ? { ...inputs, movedCurves: digestOf(star.curves) } : { ...inputs };
}

function planMap(
  before: StarInputs,
  curves: OwnCurve[],
  recipe: MapRecipe,
  { star: vary }: Variation,
  extra: Record<string, unknown> = {},
): NewMap {
  const star = vary?.(before) ?? before;
  const inputs = { ...variedInputs(before, star, curves, recipe), ...extra };
  return {
    digest: digestOf(inputs),
    inputs: { ...inputs, star: star.name, coolingName: recipe.coolingName },
    star,
    recipe,
    grid: recipe.grid,
  };
}

type Recipes = Map<string, MapRecipe>;

function planEntry(entry: Entry, variation: Variation, recipes: Recipes): NewMap | string {
  if (entry.map.origin === 'uploaded') return entry.map.digest;
  const curves = ownCurves({ entries: [entry] });
  const recipe = recipes.get(entry.survey.row.id) as MapRecipe;
  return planMap(buildStarInputs(entry.target, curves), curves, recipe, variation);
}

function planStar(
  star: SampleStar,
  { run, grid }: StudyWork,
  variation: Variation,
  recipes: Recipes,
): Planned {
  const { entries } = star;
  if (entries.length === 1) {
    const map = planEntry(entries[0], variation, recipes);
    if (typeof map === 'string') return { digest: map, maps: [], combination: null };
    return { digest: map.digest, maps: [map], combination: null };
  }
  const rule = ruleFor(star, run.recipe.combination);
  if (rule === 'same-position') {
    const recipe = { ...(recipes.get(entries[0].survey.row.id) as MapRecipe), grid };
    const joint = planMap(jointInputs(star), ownCurves(star), recipe, variation, {
      kind: 'combined',
      rule,
    });
    return { digest: joint.digest, maps: [joint], combination: null };
  }
  const maps = entries.map((entry) => planEntry(entry, variation, recipes));
  const parts = maps.map((map) => (typeof map === 'string' ? map : map.digest)).sort();
  const inputs = { kind: 'combined', rule, engineVersion: ENGINE_VERSION, maps: parts };
  const digest = digestOf(inputs);
  return {
    digest,
    maps: maps.filter((map) => typeof map !== 'string'),
    combination: { digest, inputs: { ...inputs, star: star.name }, rule, parts },
  };
}

/** What one change needs; nothing is computed yet. */
export interface PlannedVariation {
  name: string;
  /** One digest a star, in the run's order. */
  digests: string[];
  maps: NewMap[];
  combinations: NewCombination[];
  /** Why the change cannot be made at all. */
  fault: string | null;
}

export async function planVariation(
  given: StudyWork,
  sample: Sample,
  variation: Variation,
): Promise<PlannedVariation> {
  const { name, settings } = variation;
  const recipes: Recipes = new Map();
  for (const { row, recipe } of sample.surveys) {
    const changed = settings?.(row.mapSettings);
    recipes.set(row.id, changed ? await loadRecipe(given.collaborationId, changed) : recipe);
  }
  try {
    const planned = sample.stars.map((star) => planStar(star, given, variation, recipes));
    return {
      name,
      digests: planned.map(({ digest }) => digest),
      maps: planned.flatMap(({ maps }) => maps),
      combinations: planned.flatMap(({ combination }) => combination ?? []),
      fault: null,
    };
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return { name, digests: [], maps: [], combinations: [], fault: error.message };
  }
}

/**
 * Makes the maps of changes, all in one go; they are stored under their digests, and shared stars are
 * combined again by the run's rule.
 */
export async function makeVariations(
  given: StudyWork,
  planned: PlannedVariation[],
): Promise<VariedMaps[]> {
  const faults = await ensureMaps(
    given,
    planned.flatMap(({ maps }) => maps),
    'maps',
  );
  const before = given.run.inputs.stars.map(({ mapDigest }) => mapDigest);
  const made = planned.map(({ digests, maps, fault }): VariedMaps => {
    const own = maps.flatMap(({ digest }) => faults.get(digest) ?? []).sort();
    return {
      digests,
      starsUnchanged: digests.filter((digest, i) => digest === before[i]).length,
      fault: fault ?? own[0] ?? null,
    };
  });
  const whole = planned.filter((_, i) => made[i].fault === null);
  await ensureCombinations(
    given,
    whole.flatMap(({ combinations }) => combinations),
  );
  for (const { name, digests } of whole) {
    given.further.push({ what: `maps, ${name}`, digest: digestOf(digests) });
  }
  return made;
}
