import { performance } from 'node:perf_hooks';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import { computeCompletenessMap } from '@/lib/sensitivity';
import { gridOfSettings } from '@/lib/services/survey-depth';
import { COOLING, inventStars, settings } from '@/tests/bench/survey';

/** The engine alone on one thread of this process: as many invented stars on a survey's usual grid. */
export async function measureEngine(count: number): Promise<{ maps: number; seconds: number }> {
  const grid = gridOfSettings(mapSettingsSchema.parse({}));
  const stars = inventStars(count);
  const start = performance.now();
  for (const star of stars) computeCompletenessMap(star, COOLING, grid, settings('smooth'));
  const seconds = Number(((performance.now() - start) / 1000).toFixed(2));
  return { maps: count, seconds };
}
