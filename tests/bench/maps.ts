import { computeEncodedMap, decodeMap, type StarInputs } from '@/lib/sensitivity';
import type { Amount } from './amount';
import { mapErrors, referenceMap } from './reference';
import type { Errors, Line, Target } from './report';
import { type Comparison, compare, warmUp } from './rounds';
import { COOLING, GRID, inventStars, settings } from './survey';
import { monteCarloMap, prepareYardstick } from './yardsticks';

type Threshold = 'smooth' | 'hard';

const DRAWS = 10_000;
const YARDSTICK_STARS = 4;
/** Stars of one batch before the rounds, see warmUp. */
const BATCH_STARS = 100;

/** Speed and accuracy of a warm thread. */
const TARGETS: Target[] = [
  { of: 'ratio', bound: 'at least', must: 250 },
  { of: 'RMS', bound: 'at most', must: 2e-4 },
  { of: 'max', bound: 'at most', must: 5e-3 },
  { of: 'mean', bound: 'at most', must: 5e-5 },
];

/** A star's map as the product makes it: ready to be stored. */
export function engineMap(star: StarInputs, threshold: Threshold): Uint16Array {
  return computeEncodedMap(star, COOLING, GRID, settings(threshold)).encoded;
}

/** Makes maps until a thread is warm, and tells how many that took. */
export function warmUpEngine(threshold: Threshold): number {
  const stars = inventStars(BATCH_STARS);
  const batch = () => stars.reduce((sum, star) => sum + engineMap(star, threshold)[0], 0);
  return BATCH_STARS * warmUp(batch);
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
  const engine = stars.map((star) => decodeMap(engineMap(star, threshold)));
  const plain = stars.map((star) => monteCarloMap(star, threshold, DRAWS));
  return { engine: mapErrors(engine, references), plain: mapErrors(plain, references) };
}

function newLine(
  name: string,
  stars: number,
  compared: Comparison,
  errors: Errors,
  plain: Errors,
  after: number,
) {
  return {
    name,
    stars,
    rounds: compared.rounds,
    medianMs: compared.medianMs,
    ratio: compared.ratio,
    unit: 'times',
    yardstick:
      `Monte Carlo, 10^4 draws, per star (RMS ${plain.RMS.toExponential(1)})` +
      (after > 0 ? `, after ${after} stars` : ''),
    errors,
  } as const;
}

/** Maps of a survey on one thread, against a plain Monte Carlo of four of its stars. */
export function mapLines(amount: Amount): Line[] {
  prepareYardstick();
  // Before anything else has warmed the compiler up: tables are built within the first star.
  const cold = compareMaps(12, 'smooth', 1);
  const smooth = accuracy('smooth', amount);
  const first = newLine('maps, smooth, first pass', 12, cold, smooth.engine, smooth.plain, 0);
  const lines: Line[] = [{ ...first, targets: [] }];
  for (const threshold of ['smooth', 'hard'] as const) {
    const { engine, plain } = threshold === 'smooth' ? smooth : accuracy(threshold, amount);
    const after = warmUpEngine(threshold);
    for (const stars of threshold === 'smooth' ? amount.smoothMaps : amount.hardMaps) {
      const compared = compareMaps(stars, threshold, amount.rounds);
      const warm = newLine(`maps, ${threshold}, warm`, stars, compared, engine, plain, after);
      lines.push({ ...warm, targets: TARGETS });
    }
  }
  return lines;
}
