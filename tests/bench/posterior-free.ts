import { type FreeIndexQuestion, freeIndexPosterior, upperLimit } from '@/lib/inference';
import { linearAxis } from '@/lib/numerics/grid';
import { meanCompletenessOfStack, populationBox, populationWeights } from '@/lib/population';
import type { Amount } from './amount';
import type { Line } from './report';
import { compare } from './rounds';
import { GRID, type MappedSurvey, mapSurvey, POPULATION } from './survey';

const LEVEL = 0.95;
const INDICES = {
  massIndex: { min: -2, max: 1 },
  semiMajorAxisIndex: { min: -2, max: 1 },
};
const FINER_NODES = 24;

/** The plain way: a grid of both indices and of the rate, one log1p a star. */
const SIDE = 61;
const RATES = 200;
const ROWS_TIMED = 1;

function question({ maps, detections }: MappedSurvey): FreeIndexQuestion {
  return {
    maps,
    grid: GRID,
    box: populationBox(POPULATION),
    indices: INDICES,
    likelihood: 'host-fraction',
    prior: { law: 'uniform', max: 1 },
    detections,
  };
}

/** Some rows of the plain grid: mean completeness of every star, then ln L at every rate. */
function plainRows({ maps, detections }: MappedSurvey, rows: number): number {
  const isDetected = new Set(detections.map(({ star }) => star));
  const { min, max } = INDICES.massIndex;
  let sum = 0;
  for (const massIndex of linearAxis(min, max, SIDE).subarray(0, rows)) {
    for (const semiMajorAxisIndex of linearAxis(min, max, SIDE)) {
      const shape = { ...POPULATION, massIndex, semiMajorAxisIndex };
      const completeness = meanCompletenessOfStack(maps, populationWeights(GRID, shape));
      for (let r = 1; r < RATES; r++) {
        let log = 0;
        for (let star = 0; star < completeness.length; star++) {
          if (!isDetected.has(star)) log += Math.log1p((-r / RATES) * completeness[star]);
        }
        sum += Math.exp(log);
      }
    }
  }
  return sum;
}

/** Rate and both indices free: table, posterior and limit, against a plain grid. */
export function freePosteriorLines({ rounds }: Amount): Line[] {
  return [400].map((stars) => {
    const survey = mapSurvey(stars);
    const asked = question(survey);
    const limitOf = (nodes?: number) => upperLimit(freeIndexPosterior(asked, nodes).rate, LEVEL);
    const finer = limitOf(FINER_NODES);
    compare({ run: limitOf, leastMs: 300 }, { run: () => plainRows(survey, ROWS_TIMED) }, 1);
    const { medianMs, ratio } = compare(
      { run: limitOf, leastMs: 100 },
      { run: () => plainRows(survey, ROWS_TIMED), share: ROWS_TIMED / SIDE },
      rounds,
    );
    return {
      name: `posterior, both indices free, ${survey.detections.length} found`,
      stars,
      rounds,
      medianMs,
      ratio,
      unit: 'times',
      yardstick: `log1p grid, ${SIDE} × ${SIDE} × ${RATES} (${ROWS_TIMED} row timed)`,
      errors: { limit: Math.abs(limitOf() / finer - 1) },
      targets: [{ of: 'limit', bound: 'at most', must: 1e-4 }],
    };
  });
}
