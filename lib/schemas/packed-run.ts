import type { DrawnRun } from './runs';

/**
 * A run on its way to a page. What it rests on and what came out is one piece of JSON: thousands of
 * numbers that are written once and read once, not value by value with the rest of the page.
 */
export type PackedRun = Omit<DrawnRun, 'inputs' | 'result'> & {
  /** JSON of `inputs` and `result`. */
  drawn: string;
  /** Of the population that it was made under. */
  populationId: string | null;
};

export function unpackRun({ drawn, populationId: _known, ...run }: PackedRun): DrawnRun {
  return { ...run, ...(JSON.parse(drawn) as Pick<DrawnRun, 'inputs' | 'result'>) };
}
