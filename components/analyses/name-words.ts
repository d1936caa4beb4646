import { formatRange } from '@/lib/quantities/display';
import type { PopulationDefinition } from '@/lib/schemas/populations';

const numbers = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine'];

/** A small number as a word, a larger one as it is. */
export function inWords(count: number): string {
  return numbers[count] ?? String(count);
}

/** "two surveys", "12 surveys". */
export function countSurveys(count: number): string {
  return `${inWords(count)} survey${count === 1 ? '' : 's'}`;
}

/** A name that says what is asked: "Planets of 2–30 MJ at 20–300 AU, four surveys". */
export function suggestName(definition: PopulationDefinition, surveys: number): string {
  const mass = formatRange(definition.massMinMjup, definition.massMaxMjup, 'MJ');
  const axis = formatRange(definition.semiMajorAxisMinAu, definition.semiMajorAxisMaxAu, 'AU');
  return `Planets of ${mass} at ${axis}, ${countSurveys(surveys)}`;
}

/** "A, B and C". */
export function listNames(names: string[]): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;
}
