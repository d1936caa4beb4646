import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { DrawnRun } from '@/lib/schemas/runs';

const needed = [
  'surveyIds',
  'populationId',
  'likelihood',
  'prior',
  'credibleLevel',
  'detections',
  'combination',
] as const satisfies (keyof AnalysisRecipe)[];

/**
 * The recipe of a run, which the server read by its schema when the run began; undefined where a
 * part is missing that the screens rest on. The schema itself would cost every page its library.
 */
export function recipeOfRun(run: Pick<DrawnRun, 'recipe'> | null): AnalysisRecipe | undefined {
  const recipe = run?.recipe;
  if (typeof recipe !== 'object' || recipe === null) return undefined;
  return needed.every((part) => part in recipe) ? (recipe as AnalysisRecipe) : undefined;
}
