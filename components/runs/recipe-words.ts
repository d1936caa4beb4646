import { describePrior } from '@/lib/inference';
import type { AnalysisRecipe, AnalysisView } from '@/lib/schemas/analyses';
import { quantityOf } from './live-setting';

/** Each part of a recipe by its label, to be read beside those of somebody else. */
export function recipeWords(
  recipe: AnalysisRecipe,
  { population, surveys }: Pick<AnalysisView, 'population' | 'surveys'>,
): Record<string, string> {
  const { likelihood, prior, credibleLevel, detections, candidates, background } = recipe;
  const nameOf = (id: string) => surveys.find((one) => one.id === id)?.name ?? 'another survey';
  const isShown = recipe.populationId === population.id;
  return {
    'Asked for': likelihood === 'host-fraction' ? 'fraction of hosts' : 'companions per star',
    Prior: describePrior(prior, quantityOf(likelihood)),
    'Credible level': `${Number((100 * credibleLevel).toFixed(6))} %`,
    Detections: detections === 'counted' ? 'counted' : 'set aside',
    'Candidates without an answer': candidatesWords(candidates),
    'False detections expected': background === undefined ? 'none' : String(background),
    Population: isShown ? `${population.name}, version ${population.version}` : 'another one',
    Surveys: recipe.surveyIds.map(nameOf).join(', '),
    'Stars in several surveys': recipe.combination,
    Sample: recipe.sampleId === undefined ? 'all stars' : 'a saved sample',
  };
}

function candidatesWords(candidates: AnalysisRecipe['candidates']): string {
  if (candidates === undefined) return 'set aside';
  return candidates.treatment === 'fixed'
    ? 'counted with their probability'
    : `counted with their probability at a rate of ${candidates.referenceRate}`;
}
