import type { Actor } from '@/lib/access/actor';
import type { DrawnRun, RateAnswer } from '@/lib/schemas/runs';
import { getRun } from '@/lib/services/runs';

/** Digits of what a page draws: as many as exports carry, and a third of what was computed. */
const DIGITS = 6;

const round = (value: number) => Number(value.toPrecision(DIGITS));
const roundAll = (values: number[]) => values.map(round);

function roundCurve(answer: RateAnswer): RateAnswer {
  const { value, density, cumulative, prior } = answer.curve;
  const curve = {
    value: roundAll(value),
    density: roundAll(density),
    cumulative: roundAll(cumulative),
    prior: roundAll(prior),
  };
  return { ...answer, curve };
}

/**
 * A run for a page: its curves, its mean map and the shares of its stars to six digits. Limits,
 * intervals and the nodes of the grid stay as they were computed. What no page draws stays behind.
 */
export async function drawnRun(actor: Actor, id: string): Promise<DrawnRun> {
  const run = await getRun(actor, id);
  const { inputs, result } = run;
  if (!inputs || !result) return run;
  return {
    ...run,
    inputs: {
      ...inputs,
      stars: inputs.stars.map(({ mapId: _row, mapChecksum: _bytes, ...star }) => star),
    },
    result: {
      ...result,
      answer: roundCurve(result.answer),
      zero: roundCurve(result.zero),
      meanMap: { ...result.meanMap, completeness: result.meanMap.completeness.map(roundAll) },
      depth: {
        ...result.depth,
        surveys: result.depth.surveys.map((one) => ({ ...one, stars: roundAll(one.stars) })),
      },
      starTable: result.starTable.map(({ starId, probability }) => ({
        starId,
        probability: round(probability),
      })),
    },
  };
}
