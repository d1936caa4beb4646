import { changeRecipe, copyAnalysis, requireRecipe } from '@/components/hooks/use-analyses';
import { createPopulation, savePopulationVersion } from '@/components/hooks/use-populations';
import { startRun } from '@/components/hooks/use-runs';
import type { AnalysisRecipe, AnalysisView } from '@/lib/schemas/analyses';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { LiveSetting } from './live-setting';
import { hasOwnPopulation } from './shared-version';

/**
 * Stores a setting in the recipe and starts a run of it.
 *
 * Ranges and indices belong to a population, so a change of theirs makes a version of it; whoever
 * may not add a version gets a population of their own.
 *
 * @param analysis its recipe is the one that the setting began from
 * @throws ChangedMeanwhile before anything is stored, where the recipe is another one by now;
 *   ApiProblem at the first step that the server refuses
 */
export async function saveAndRun(
  collaboration: string,
  analysis: AnalysisView,
  setting: LiveSetting,
): Promise<void> {
  const { definition: _ofPopulation, ...asked } = setting;
  await requireRecipe(collaboration, analysis.key, analysis.recipe);
  const population: { id: string } = hasOwnPopulation(analysis, setting)
    ? await storePopulation(collaboration, analysis.population, setting)
    : analysis.population;
  const recipe = await recipeOf({ ...analysis.recipe, populationId: population.id }, asked);
  await changeRecipe(collaboration, analysis.key, analysis.recipe, recipe);
  await startRun(collaboration, analysis.key);
}

/** A setting that has neither candidates nor a background takes them out of the recipe. */
export async function recipeOf(
  recipe: AnalysisRecipe,
  {
    definition: _ofPopulation,
    ...asked
  }: Partial<Pick<LiveSetting, 'definition'>> & Omit<LiveSetting, 'definition'>,
): Promise<AnalysisRecipe> {
  const { candidates: _candidates, background: _background, ...rest } = recipe;
  const { analysisRecipeSchema } = await import('@/lib/schemas/analyses');
  return analysisRecipeSchema.parse({ ...rest, ...asked });
}

/** The same on a copy, which belongs to whoever made it: its key. */
export async function copyAndRun(
  collaboration: string,
  analysis: AnalysisView,
  setting: LiveSetting,
): Promise<string> {
  const copy = await copyAnalysis(collaboration, analysis.key, {
    detections: setting.detections,
  });
  await saveAndRun(collaboration, copy, setting);
  return copy.key;
}

function storePopulation(
  collaboration: string,
  population: ListedPopulation,
  { definition }: LiveSetting,
): Promise<{ id: string }> {
  if (population.can.saveVersion) {
    return savePopulationVersion(collaboration, population.key, { definition });
  }
  return createPopulation(collaboration, {
    name: `${population.name}, own ranges`,
    note: `From ${population.key}, version ${population.version}`,
    convention: 'log',
    definition,
    isShared: false,
  });
}
