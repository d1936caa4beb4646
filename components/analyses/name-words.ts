import { describePlanets } from '@/lib/inference';
import type { ListedDefinition } from '@/lib/schemas/populations';

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
export function suggestName(definition: ListedDefinition, surveys: number): string {
  const planets = describePlanets(definition);
  return `${planets[0].toUpperCase()}${planets.slice(1)}, ${countSurveys(surveys)}`;
}

/** "A, B and C". */
export function listNames(names: string[]): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;
}
