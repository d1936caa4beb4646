import { InputError } from '@/lib/errors';
import type { BundleContent } from '@/lib/schemas/bundles';
import { SurveyRow } from '@/models';
import { applyAdopted } from '@/models/adopted-values';
import { adoptedOfBundle, rowsOfBundle } from '@/models/bundle-rows';
import { mapDigest, mapInputs, recipeWithTable } from '@/models/map-recipe';
import { buildStarInputs, MissingInput } from '@/models/star-inputs';
import type { CompletedMap, CompleteMapsInput } from '../compute/complete-maps';
import { inLanes } from '../lanes';
import type { Work } from '../perform';
import { type Collected, type Computed, computeCollected } from './compute-run';
import { type MapShelf, memoryShelf } from './map-shelf';
import { combinationOf } from './run-combination';
import { mergeRows } from './run-companions';
import { hostMassesFor } from './run-hosts';
import { gatherSample, type LoadedTarget, type SampleSurvey } from './run-sample';
import { selectionOf } from './run-selection';

const STARS_PER_TASK = 4;

function surveysOf(content: BundleContent, collaborationId: string): SampleSurvey[] {
  const { recipe, coolingTables } = content;
  return recipe.surveys.map((survey) => {
    const { cooling } = survey.mapSettings;
    const table =
      cooling.kind === 'built-in'
        ? null
        : coolingTables.find(({ id }) => id === cooling.coolingTableId);
    if (table === undefined) throw new Error(`no cooling table of ${survey.name}`);
    return {
      row: SurveyRow.build({ ...survey, collaborationId }),
      recipe: recipeWithTable(survey.mapSettings, table),
    };
  });
}

type Rows = ReturnType<typeof rowsOfBundle>;

/** Computes every map that the bundle's curves give, and links the targets to them. */
async function completeMaps(
  work: Work,
  { targets, curves }: Rows,
  surveys: SampleSurvey[],
  shelf: MapShelf,
  onProgress: (done: number, total: number) => Promise<void>,
): Promise<void> {
  const wanted = targets.flatMap((target) => {
    const ownCurves = curves
      .filter(({ targetId }) => targetId === target.id)
      .map((curve) => ({ target, curve }));
    const survey = surveys.find(({ row }) => row.id === target.surveyId);
    if (target.mapState === 'ready' || ownCurves.length === 0 || !survey) return [];
    try {
      const star = buildStarInputs(target, ownCurves);
      const inputs = mapInputs(star, ownCurves, survey.recipe);
      return [{ target, star, inputs, survey, digest: mapDigest(inputs) }];
    } catch (error) {
      if (!(error instanceof MissingInput)) throw error;
      target.set({ mapState: 'failed', mapFault: error.message });
      return [];
    }
  });
  const batches: (typeof wanted)[] = [];
  for (const one of wanted) {
    const last = batches.at(-1);
    if (last && last.length < STARS_PER_TASK && last[0].survey === one.survey) last.push(one);
    else batches.push([one]);
  }
  let done = 0;
  await onProgress(0, wanted.length);
  await inLanes(batches, work.pool.threads + 1, async (batch) => {
    const { cooling, grid, settings } = batch[0].survey.recipe;
    const answers = await work.pool.run<CompleteMapsInput, CompletedMap[]>(
      'complete-maps',
      { stars: batch.map(({ star }) => star), cooling, grid, settings },
      { signal: work.signal },
    );
    for (const [i, answer] of answers.entries()) {
      const { target, digest, inputs } = batch[i];
      if ('fault' in answer) target.set({ mapState: 'failed', mapFault: answer.fault });
      else await shelf.keep({ ...grid, digest, inputs, ...answer });
    }
    done += batch.length;
    await onProgress(done, wanted.length);
  });
  for (const { target, digest } of wanted) {
    const [row] = await shelf.read([digest]);
    if (row && target.mapState !== 'failed') target.set({ mapId: row.id, mapState: 'ready' });
  }
}

/**
 * Computes the run of a bundle from its inputs alone: no table is read, and none is written.
 *
 * @throws InputError where the bundle's inputs give no run
 */
export async function computeBundle(
  work: Work,
  content: BundleContent,
  report: {
    maps(done: number, total: number): Promise<void>;
    enter(stage: string, total: number): Promise<void>;
  },
): Promise<Computed> {
  const { collaborationId } = work.attempt;
  const { recipe: stated } = content;
  const rows = rowsOfBundle(content, collaborationId);
  const shelf = memoryShelf(collaborationId, rows.maps);
  const adopted = adoptedOfBundle(content);
  for (const target of rows.targets) applyAdopted(target, adopted);
  const surveys = surveysOf(content, collaborationId);
  await completeMaps(work, rows, surveys, shelf, report.maps);
  const population = stated.population as Collected['population'];
  const combination = stated.combination ? combinationOf(stated.combination, stated.surveys) : null;
  if (combination) {
    const { surveyIds: order } = combination.definition;
    surveys.sort((a, b) => order.indexOf(a.row.id) - order.indexOf(b.row.id));
  }
  const asked = stated.recipe.surveyIds;
  const own = surveys.filter(({ row }) => asked.includes(row.id));
  if (own.length === 0) throw new InputError({ code: 'no-survey', message: 'no survey is left' });
  const targets = rows.targets.filter(({ surveyId }) => asked.includes(surveyId));
  const curvesOf = new Map<string, Rows['curves']>();
  for (const curve of [...rows.curves].sort((a, b) => (a.digest < b.digest ? -1 : 1))) {
    curvesOf.set(curve.targetId, [...(curvesOf.get(curve.targetId) ?? []), curve]);
  }
  const sample = gatherSample({
    surveys: own,
    combination,
    selection: stated.sample ? selectionOf(stated.sample, stated.surveys) : null,
    adopted,
    targets: targets as LoadedTarget[],
    mapOf: new Map(shelf.all().map((map) => [map.id, map])),
    curvesOf,
  });
  const { definition } = population;
  const targetIds = new Set(sample.stars.flatMap(({ entries }) => entries.map((e) => e.target.id)));
  const companions = mergeRows(
    sample.stars,
    definition,
    rows.companions.filter(({ targetId }) => targetIds.has(targetId)),
  );
  const hostMassMsun = hostMassesFor(definition, sample.stars);
  const { seed, engineVersion } = stated.run;
  const run = { recipe: stated.recipe, seed, engineVersion };
  const { shared } = stated;
  const collected = { run, population, sample, hostMassMsun, companions, shared };
  return computeCollected(work, collected, shelf, {
    enter: report.enter,
    combined: (done, total) => report.maps(done, total),
  });
}
