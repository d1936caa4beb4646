import { describePrior } from '@/lib/inference';
import { type DescribedPopulation, describePlanets } from '@/lib/inference/population-words';
import type { RatePriorInput } from '@/lib/schemas/analyses';
import type { RunResult } from '@/lib/schemas/runs';
import { LISTED_DEFINITION } from '../populations';

/** What a query of frozen runs reads of what each limit rests on. */
export interface Ground {
  quantity: RunResult['quantity'];
  definition: DescribedPopulation;
  ratePrior: RatePriorInput;
  counted: number;
  candidates: number;
}

/** Its columns: of `r` the run, `p` its population, `x` its result as `JOIN_GROUND` unpacks it. */
export const GROUND = `x.quantity, ${LISTED_DEFINITION} as definition, r.recipe->'prior' as "ratePrior",
  jsonb_array_length(x.counted) as counted,
  coalesce(jsonb_array_length(x.candidates->'entries'), 0) as candidates`;

export const JOIN_GROUND = `
  join population p on p.id = (r.recipe->>'populationId')::uuid
  left join lateral jsonb_to_record(r.result) as x(
    quantity text, answer jsonb, statement jsonb, counted jsonb, candidates jsonb) on true`;

const many = (count: number, noun: string) => `${count} ${noun}${count === 1 ? '' : 's'}`;

/** Ranges, prior and what counted, so that limits with the same sentence are told apart. */
export function restsOn({ quantity, definition, ratePrior, counted, candidates }: Ground) {
  const found = counted === 0 ? 'zero detections' : many(counted, 'detection');
  return {
    ranges: describePlanets(definition),
    prior: describePrior(ratePrior, quantity),
    detections:
      candidates === 0
        ? found
        : `${found}, ${many(candidates, 'candidate')} counted by probability`,
  };
}
