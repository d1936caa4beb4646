import { formatPlain } from '@/lib/quantities/display';
import { COOLING_AS_RUN } from '@/lib/schemas/stack-choices';
import type { AgesCoolingAnswer } from '@/lib/schemas/studies';
import type { Under } from './under';

export type Models = AgesCoolingAnswer['result']['models'];

/** "every star 1 σ younger"; null where ages are the run's. */
export function agesInWords({ ageShift = 0 }: Under): string | null {
  if (ageShift === 0) return null;
  const way = ageShift < 0 ? 'younger' : 'older';
  const between = Number.isInteger(ageShift) ? '' : ', between the maps for whole σ';
  return `every star ${formatPlain(Math.abs(ageShift))}\u2009σ ${way}${between}`;
}

/** The cooling model that a limit stands under; the run's own words where it is the run's. */
export function coolingInWords(inRun: string, { cooling }: Under, models: Models = []): string {
  if (cooling === undefined || cooling === COOLING_AS_RUN) return inRun;
  return models.find(({ model }) => model === cooling)?.name ?? 'another cooling model';
}
