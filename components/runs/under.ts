import { COOLING_AS_RUN } from '@/lib/schemas/stack-choices';

/** Ages and cooling model that a limit is asked under; left out: those of the run. */
export interface Under {
  /** In sigma of each star's own age, positive for older. */
  ageShift?: number;
  cooling?: string;
}

export const isAsRun = ({ ageShift = 0, cooling = COOLING_AS_RUN }: Under): boolean =>
  ageShift === 0 && cooling === COOLING_AS_RUN;
