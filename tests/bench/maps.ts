import { computeCompletenessMap, type StarInputs } from '@/lib/sensitivity';
import type { Amount } from './amount';
import { mapErrors, referenceMap } from './reference';
import type { Errors, Line, Target } from './report';
import { type Comparison, compare } from './rounds';
import { COOLING, GRID, inventStars, settings } from './survey';
import { monteCarloMap, prepareYardstick } from './yardsticks';

type Threshold = 'smooth' | 'hard';

const DRAWS = 10_000;
const YARDSTICK_STARS = 4;
/** So many stars before the rounds, so that the compiler has seen the work. */
const WARM_UP_STARS = 40;

/** Speed and accuracy of a warm thread. */
const TARGETS: Target[] = [
  { of: 'ratio', bound: 'at least', must: 250 },
  { of: 'RMS', bound: 'at most', must: 2e-4 },
  { of: 'max', bound: 'at most', must: 5e-3 },
  { of: 'mean', bound: 'at most', must: 5e-5 },
];

function engineMap(star: StarInputs, threshold: Threshold): Float64Array {
  return computeCompletenessMap(star, COOLING, GRID, settings(threshold)).map.completeness;
}

function compareMaps(stars: number, threshold: Threshold, rounds: number): Comparison {
  const sample = inventStars(stars);
  const few = inventStars(YARDSTICK_STARS);
  const engine = () => sample.reduce((sum, star) => sum + engineMap(star, threshold)[0], 0);
  const plain = () => few.reduce((sum, star) => sum + monteCarloMap(star, threshold, DRAWS)[0], 0);
  return compare({ run: engine, share: stars }, { run: plain, share: YARDSTICK_STARS }, rounds);
}

/** Errors of engine and yardstick on the same stars, against the reference of this run. */
function accuracy(threshold: Threshold, { resolution }: Amount) {
  const stars = inventStars(YARDSTICK_STARS);
  const references = stars.map((star) => referenceMap(star, threshold, resolution[threshold]));
  const engine = stars.map((star) => engineMap(star, threshold));
  const plain = stars.map((star) => monteCarloMap(star, threshold, DRAWS));
  return { engine: mapErrors(engine, references), plain: mapErrors(plain, references) };
}

function newLine(name: string, stars: number, compared: Comparison, errors: Errors, plain: Errors) {
  return {
    name,
    stars,
    rounds: compared.rounds,
    medianMs: compared.medianMs,
    ratio: compared.ratio,
    unit: 'times',
    yardstick: `Monte Carlo, 10^4 draws, per star (RMS ${plain.RMS.toExponential(1)})`,
    errors,
  } as const;
}

/** Maps of a survey on one thread, against a plain Monte Carlo of four of its stars. */
export function mapLines(amount: Amount): Line[] {
  prepareYardstick();
  // Before anything else has warmed the compiler up: tables are built within the first star.
  const cold = compareMaps(12, 'smooth', 1);
  const smooth = accuracy('smooth', amount);
  const first = newLine('maps, smooth, first pass', 12, cold, smooth.engine, smooth.plain);
  const lines: Line[] = [{ ...first, targets: [] }];
  for (const threshold of ['smooth', 'hard'] as const) {
    const { engine, plain } = threshold === 'smooth' ? smooth : accuracy(threshold, amount);
    for (const star of inventStars(WARM_UP_STARS)) engineMap(star, threshold);
    for (const stars of threshold === 'smooth' ? amount.smoothMaps : amount.hardMaps) {
      const compared = compareMaps(stars, threshold, amount.rounds);
      const warm = newLine(`maps, ${threshold}, warm`, stars, compared, engine, plain);
      lines.push({ ...warm, targets: TARGETS });
    }
  }
  return lines;
}
