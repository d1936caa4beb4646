import { copyAnalysis, updateAnalysis } from '@/components/hooks/use-analyses';
import { createPopulation, savePopulationVersion } from '@/components/hooks/use-populations';
import { startRun } from '@/components/hooks/use-runs';
import type { AnalysisRecipe, AnalysisView } from '@/lib/schemas/analyses';
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import type { ListedPopulation } from '@/lib/schemas/populations';
import { isSameDefinition, type LiveSetting } from './live-setting';

/**
 * Stores a setting in the recipe and starts a run of it.
 *
 * Ranges and indices belong to a population, so a change of theirs makes a version of it; whoever
 * may not add a version gets a population of their own.
 *
 * @throws ApiProblem at the first step that the server refuses
 */
export async function saveAndRun(
  collaboration: string,
  analysis: AnalysisView,
  setting: LiveSetting,
): Promise<void> {
  const { definition, ...asked } = setting;
  const before = analysis.population.definition;
  const population: { id: string } =
    isPlainPowerLaw(before) && isSameDefinition(definition, before)
      ? analysis.population
      : await storePopulation(collaboration, analysis.population, setting);
  const { analysisRecipeSchema } = await import('@/lib/schemas/analyses');
  await updateAnalysis(collaboration, analysis.key, {
    recipe: analysisRecipeSchema.parse({
      ...withoutOptions(analysis.recipe),
      ...asked,
      populationId: population.id,
    }),
  });
  await startRun(collaboration, analysis.key);
}

/** A setting that has neither candidates nor a background takes them out of the recipe. */
function withoutOptions(recipe: AnalysisRecipe) {
  const { candidates: _candidates, background: _background, ...rest } = recipe;
  return rest;
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
