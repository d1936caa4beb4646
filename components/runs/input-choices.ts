import { formatPlain } from '@/lib/quantities/display';
import { COOLING_AS_RUN } from '@/lib/schemas/stack-choices';
import type { AgesCoolingAnswer } from '@/lib/schemas/studies';
import type { Models } from './input-words';

/** "+0.5 σ": a shift of all ages, as its control shows it. */
export function formatShift(shift: number): string {
  return `${shift > 0 ? '+' : ''}${formatPlain(shift)}\u2009σ`;
}

/** "hot", "cold": what a model starts from, where it says so and no other does the same. */
export function modelLabel(model: Models[number], models: Models): string {
  const isAlone =
    models.filter(({ startCondition }) => startCondition === model.startCondition).length === 1;
  if (model.startCondition !== 'unstated' && isAlone) return model.startCondition;
  return model.model === COOLING_AS_RUN ? 'as in the run' : model.name;
}

/** Ends of the shifts for which a model has maps, without a gap between them. */
export function shiftsOf(
  { result }: AgesCoolingAnswer,
  cooling: string = COOLING_AS_RUN,
): [number, number] {
  const { ageShifts, models } = result;
  const shifts = models.find(({ model }) => model === cooling)?.shifts ?? [];
  const centre = ageShifts.indexOf(0);
  let [first, last] = [centre, centre];
  while (first > 0 && shifts[first - 1]?.hasMaps) first--;
  while (last < shifts.length - 1 && shifts[last + 1]?.hasMaps) last++;
  return [ageShifts[first], ageShifts[last]];
}
