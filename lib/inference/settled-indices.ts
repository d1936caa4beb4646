import {
  type FreeIndexPosterior,
  type FreeIndexQuestion,
  freeIndexPosterior,
} from './free-indices';
import { indexDistribution } from './index-summaries';
import { INDEX_NODES } from './index-table';
import { upperLimit } from './intervals';

/** An end of a range of indices at which the posterior has not yet fallen off. */
export interface LimitingEnd {
  index: 'massIndex' | 'semiMajorAxisIndex';
  end: 'min' | 'max';
  /** Share of the posterior in the outermost of 61 cells [fraction]. */
  share: number;
}

/** A posterior with free indices whose nodes were doubled until it stood still. */
export interface SettledIndices {
  posterior: FreeIndexPosterior;
  level: number;
  limit: number;
  /** Nodes a side that were used. */
  nodes: number;
  /** Relative move of the limit when the nodes were last doubled. */
  limitMovedBy: number;
  /** Largest move of a mean then: relative for the rate, absolute for the indices. */
  meansMovedBy: number;
  /** False where the most nodes allowed did not bring it to rest. */
  isSettled: boolean;
  limitingEnds: LimitingEnd[];
  /** Plain sentences on what the answer rests on. */
  notes: string[];
}

const LIMIT_MOVE = 1e-4;
const MEANS_MOVE = 2e-3;
const MOST_NODES = 96;
/** Entries of a table a star and pair of nodes, 8 bytes each. */
const MOST_ENTRIES = 4e7;
const CELLS = 61;
const LIMITING_SHARE = 0.01;

function meansOf(posterior: FreeIndexPosterior): [number, number] {
  const { logShare, table } = posterior;
  const columns = table.semiMajorAxisIndex.at.length;
  let [alpha, beta] = [0, 0];
  for (let node = 0; node < logShare.length; node++) {
    const share = Math.exp(logShare[node]);
    alpha += share * table.massIndex.at[Math.floor(node / columns)];
    beta += share * table.semiMajorAxisIndex.at[node % columns];
  }
  return [alpha, beta];
}

function moveOfMeans(from: FreeIndexPosterior, to: FreeIndexPosterior): number {
  const [alpha, beta] = meansOf(from);
  const [newAlpha, newBeta] = meansOf(to);
  return Math.max(
    Math.abs(from.rate.mean / to.rate.mean - 1),
    Math.abs(newAlpha - alpha),
    Math.abs(newBeta - beta),
  );
}

/** Ends of the ranges whose outermost cell, of 61, holds more than 1 % of the posterior. */
export function limitingEnds(posterior: FreeIndexPosterior): LimitingEnd[] {
  return (['massIndex', 'semiMajorAxisIndex'] as const).flatMap((index) => {
    const { min, max } = posterior.table[index].range;
    const { cumulative } = indexDistribution(posterior, index);
    const cell = (max - min) / CELLS;
    const ends: LimitingEnd[] = [
      { index, end: 'min', share: cumulative(min + cell) },
      { index, end: 'max', share: 1 - cumulative(max - cell) },
    ];
    return ends.filter(({ share }) => share > LIMITING_SHARE);
  });
}

const INDEX_NAMES = { massIndex: 'mass index', semiMajorAxisIndex: 'semi-major axis index' };

function notesOn(settled: Omit<SettledIndices, 'notes'>): string[] {
  const notes: string[] = [];
  const { limitingEnds: ends, posterior, isSettled, nodes, limitMovedBy } = settled;
  if (ends.length > 0) {
    const named = ends.map(
      ({ index, end }) => `${end === 'min' ? 'lower' : 'upper'} end of the ${INDEX_NAMES[index]}`,
    );
    notes.push(
      `The range of indices limits the result: more than 1 % of the posterior lies in the outermost ` +
        `of 61 cells at the ${named.join(', the ')}.`,
    );
  }
  if (posterior.counted.length === 0) {
    notes.push(
      'Nothing was detected: the posterior of the indices only says where companions would have ' +
        'been seen.',
    );
  }
  if (!posterior.mixture.constrained) {
    notes.push('These data do not constrain this population: the posterior is the prior.');
  }
  if (!isSettled) {
    notes.push(
      `${nodes} nodes a side did not bring the answer to rest: ` +
        (Number.isFinite(limitMovedBy)
          ? `the limit still moved by ${limitMovedBy.toExponential(1)} of itself when they were last doubled.`
          : 'the sample is too large to double them.'),
    );
  }
  return notes;
}

/**
 * Posterior of the rate and of both indices, the nodes doubled until the answer stands still.
 *
 * Doubling must move the limit by less than 1e-4 of itself and the means by less than 2e-3.
 *
 * @param question as `freeIndexPosterior`
 * @param level credible level of the limit [fraction]
 * @param options nodes a side to begin with (default 12), and the most (default 96, fewer where a
 *   table of every star would exceed 320 MB)
 * @throws RangeError as `freeIndexPosterior`, and for a level outside (0, 1)
 * Cost: 12 and then 24 nodes for ranges some units wide: five times `freeIndexPosterior`.
 */
export function freeIndices(
  question: FreeIndexQuestion,
  level: number,
  options: { nodes?: number; mostNodes?: number } = {},
): SettledIndices {
  const { nodes: start = INDEX_NODES, mostNodes = MOST_NODES } = options;
  if (!(mostNodes >= 2 * start)) {
    throw new RangeError(`mostNodes must allow ${start} nodes to be doubled, got ${mostNodes}`);
  }
  let nodes = start;
  let posterior = freeIndexPosterior(question, nodes);
  let limit = upperLimit(posterior.rate, level);
  let [limitMovedBy, meansMovedBy] = [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY];
  const isAtRest = () => limitMovedBy <= LIMIT_MOVE && meansMovedBy <= MEANS_MOVE;
  const fits = (side: number) =>
    side <= mostNodes &&
    (posterior.table.completeness === null || side ** 2 * posterior.table.stars <= MOST_ENTRIES);
  while (!isAtRest() && fits(2 * nodes)) {
    nodes *= 2;
    const finer = freeIndexPosterior(question, nodes);
    const moved = upperLimit(finer.rate, level);
    limitMovedBy = Math.abs(limit / moved - 1);
    meansMovedBy = moveOfMeans(posterior, finer);
    [posterior, limit] = [finer, moved];
  }
  const settled = {
    posterior,
    level,
    limit,
    nodes,
    limitMovedBy,
    meansMovedBy,
    isSettled: isAtRest(),
    limitingEnds: limitingEnds(posterior),
  };
  return { ...settled, notes: notesOn(settled) };
}
