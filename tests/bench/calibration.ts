import { type CalibrationSetup, calibrationPart } from '@/lib/inference';
import { createRandom } from '@/lib/numerics/random';
import type { Amount } from './amount';
import type { Line } from './report';
import { compare } from './rounds';
import { mapSurvey, SEED } from './survey';

const SURVEYS = 1000;
const STARS = 400;
const POINTS = 500;

/** Every outcome times a table of ln(1 - f C_j) in full: a matrix product, on a plain grid. */
function productOfTables(completeness: Float64Array): number {
  const random = createRandom(SEED);
  const table = Float64Array.from({ length: POINTS * STARS }, (_, i) =>
    Math.log1p(-((Math.floor(i / STARS) + 0.5) / POINTS) * completeness[i % STARS]),
  );
  let sum = 0;
  const isSeen = new Float64Array(STARS);
  for (let survey = 0; survey < SURVEYS; survey++) {
    const truth = random.uniform();
    let found = 0;
    for (let j = 0; j < STARS; j++) {
      isSeen[j] = random.uniform() < truth * completeness[j] ? 0 : 1;
      found += 1 - isSeen[j];
    }
    let [total, below] = [0, 0];
    const logs = new Float64Array(POINTS);
    for (let i = 0; i < POINTS; i++) {
      let value = found * Math.log((i + 0.5) / POINTS);
      for (let j = 0; j < STARS; j++) value += isSeen[j] * table[i * STARS + j];
      logs[i] = value;
    }
    const peak = logs.reduce((a, b) => Math.max(a, b));
    logs.forEach((value, i) => {
      const density = Math.exp(value - peak);
      total += density;
      if ((i + 0.5) / POINTS < truth) below += density;
    });
    sum += below / total;
  }
  return sum;
}

/** Invented surveys with their posteriors, host fraction, uniform prior. */
export function calibrationLines({ rounds }: Amount): Line[] {
  const { completeness } = mapSurvey(STARS);
  const setup: CalibrationSetup = {
    likelihood: 'host-fraction',
    completeness,
    prior: { law: 'uniform', max: 1 },
    rates: [],
    surveys: SURVEYS,
    parts: 1,
    seed: SEED,
  };
  const product = () => calibrationPart(setup, 0).below.reduce((a, b) => a + b, 0);
  const compared = compare({ run: product }, { run: () => productOfTables(completeness) }, rounds);
  return [
    {
      name: `calibration, ${SURVEYS} surveys`,
      stars: STARS,
      rounds,
      medianMs: compared.medianMs,
      ratio: compared.ratio,
      unit: 'times',
      yardstick: `full product of tables, ${POINTS} points`,
      errors: {},
      targets: [{ of: 'ratio', bound: 'at least', must: 2 }],
    },
  ];
}
