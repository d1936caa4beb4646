import { type Packed, unpack } from './packed';
import type { DrawnRun } from './runs';

/** A run on its way to a page. */
export type PackedRun = Omit<DrawnRun, 'inputs' | 'result'> & {
  drawn: Packed<Pick<DrawnRun, 'inputs' | 'result'>>;
  /** Of the population that it was made under. */
  populationId: string | null;
};

export function unpackRun({ drawn, populationId: _known, ...run }: PackedRun): DrawnRun {
  return { ...run, ...unpack(drawn) };
}
