/** One side of a comparison: a piece of work that returns a number, so that it is really done. */
export interface Work {
  run(): number;
  /** Runs at least this long within a round, so that the clock's own step does not count [ms of processor time]. */
  leastMs?: number;
  /** The time of a run is divided by it, to compare per star. */
  share?: number;
}

export interface Spread {
  median: number;
  min: number;
  max: number;
}

export interface Comparison {
  rounds: number;
  /** One run of the subject, not divided by its share. */
  medianMs: number;
  yardstickMs: number;
  /** Yardstick over subject, both per share, round by round. */
  ratio: Spread;
}

let kept = 0;

/** Keeps the results alive: a run whose result nobody reads may be left out by the compiler. */
export function keptSum(): number {
  return kept;
}

/**
 * Processor time of one run [ms]: on a machine that is busy with something else the clock on the
 * wall would count the others' work too.
 */
export function millisecondsOf({ run, leastMs = 0 }: Work): number {
  const start = process.cpuUsage();
  let runs = 0;
  let elapsed: number;
  do {
    kept += run();
    runs++;
    const { user, system } = process.cpuUsage(start);
    elapsed = (user + system) / 1000;
  } while (elapsed < leastMs);
  return elapsed / runs;
}

export function spreadOf(values: number[]): Spread {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  const median = sorted.length % 2 ? sorted[half] : 0.5 * (sorted[half - 1] + sorted[half]);
  return { median, min: sorted[0], max: sorted[sorted.length - 1] };
}

/**
 * Both sides round by round, the one that begins changing each time: what else the machine does
 * then weighs on both alike.
 */
export function compare(subject: Work, yardstick: Work, rounds: number): Comparison {
  const subjectMs: number[] = [];
  const yardstickMs: number[] = [];
  for (let round = 0; round < rounds; round++) {
    if (round % 2 === 0) subjectMs.push(millisecondsOf(subject));
    yardstickMs.push(millisecondsOf(yardstick));
    if (round % 2 === 1) subjectMs.push(millisecondsOf(subject));
  }
  const scale = (subject.share ?? 1) / (yardstick.share ?? 1);
  return {
    rounds,
    medianMs: spreadOf(subjectMs).median,
    yardstickMs: spreadOf(yardstickMs).median,
    ratio: spreadOf(subjectMs.map((ms, round) => (scale * yardstickMs[round]) / ms)),
  };
}

/** A piece of work alone, against a length of time that the machine does not change. */
export function shareOf(subject: Work, lengthMs: number, rounds: number) {
  const times = Array.from({ length: rounds }, () => millisecondsOf(subject));
  return {
    rounds,
    medianMs: spreadOf(times).median,
    ratio: spreadOf(times.map((ms) => ms / lengthMs)),
  };
}

/** A piece of work that says itself how long it took [ms]: another process, or one that waits. */
export type TimedWork = () => Promise<number>;

/** Milliseconds on the wall of work that other processes have a part in. */
export async function wallMilliseconds(run: () => Promise<number> | number): Promise<number> {
  const start = performance.now();
  kept += await run();
  return performance.now() - start;
}

/**
 * As `compare`, for work that times itself.
 *
 * @param scale the yardstick's time is multiplied by it, to stand for as much work as the subject's
 */
export async function compareTimed(
  subject: TimedWork,
  yardstick: TimedWork,
  rounds: number,
  scale = 1,
): Promise<Comparison> {
  const subjectMs: number[] = [];
  const yardstickMs: number[] = [];
  for (let round = 0; round < rounds; round++) {
    if (round % 2 === 0) subjectMs.push(await subject());
    yardstickMs.push(await yardstick());
    if (round % 2 === 1) subjectMs.push(await subject());
  }
  return {
    rounds,
    medianMs: spreadOf(subjectMs).median,
    yardstickMs: spreadOf(yardstickMs).median,
    ratio: spreadOf(subjectMs.map((ms, round) => (scale * yardstickMs[round]) / ms)),
  };
}

/** Batches in a row without a new best time after which a thread counts as warm. */
const BATCHES_WITHOUT_GAIN = 20;
/** A best time that is nearer than this to the last one is no gain. */
const GAIN = 0.01;
const MOST_BATCHES = 200;

/**
 * Repeats a batch until it gets no faster: the compiler has then seen the work often enough.
 *
 * @returns number of batches
 */
export function warmUp(run: () => number): number {
  let best = Infinity;
  let without = 0;
  let batches = 0;
  while (without < BATCHES_WITHOUT_GAIN && batches < MOST_BATCHES) {
    const ms = millisecondsOf({ run });
    batches++;
    without = ms < (1 - GAIN) * best ? 0 : without + 1;
    best = Math.min(best, ms);
  }
  return batches;
}
