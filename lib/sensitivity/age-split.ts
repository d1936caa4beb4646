import type { WeightedNodes } from './age';
import { type AgeSide, ageSides, sideNodes, spreadOf } from './age-sides';
import type { AgeOfStar, SensitivitySettings } from './types';

/** An age made ready for one threshold: what is integrated over, what counts as single values. */
export interface SplitAge {
  sides: AgeSide[];
  single: WeightedNodes;
  /** Width of the cells of magnitude that follows both age and threshold, [mag]. */
  cellMag: number;
}

/**
 * Widths of cells under a smooth threshold, times n: its own width is 1.09 mag / n. Ages blur it
 * further, so that wider cells do for an age that is uncertain enough.
 */
const SMOOTH_CELL_TIMES_SIGMA = { single: 0.3125, narrow: 0.625, wide: 1.25 } as const;
/** Spread in ln t from which an age is wide: 0.1 dex. */
const WIDE_SPREAD = 0.23;
/** Widths of cells are halves of halves, so that stars share what is kept per width. */
const WIDEST_CELL_MAG = { smooth: 0.25, hard: 0.2 } as const;
const NARROWEST_CELL_MAG = 0.025;
/** A companion fades by at least about a magnitude as its age grows by a factor e. */
const CELL_PER_SPREAD = 0.7;
const NODES_OF_NARROW_SIDE = { smooth: 6, hard: 10 } as const;

/**
 * Splits an age: sides as wide as the cells are integrated exactly, narrower ones are a few nodes.
 *
 * @param age see AgeOfStar
 * @param forced the nodes of the settings, used where these ask for a number of nodes
 * @param settings threshold and number of nodes
 * @param nSigma n of the smooth threshold
 */
export function splitAge(
  age: AgeOfStar,
  forced: () => WeightedNodes,
  settings: Pick<SensitivitySettings, 'threshold' | 'ageNodesPerSide'>,
  nSigma: number,
): SplitAge {
  const isHard = settings.threshold === 'hard';
  const smooth = (kind: keyof typeof SMOOTH_CELL_TIMES_SIGMA) =>
    stepNotAbove(SMOOTH_CELL_TIMES_SIGMA[kind] / nSigma, 'smooth');
  if (settings.ageNodesPerSide !== undefined) {
    return { sides: [], single: forced(), cellMag: smooth('single') };
  }
  const { points, sides } = ageSides(age);
  const spreads = sides.map(spreadOf);
  const isFollowed = (spread: number) => spread * CELL_PER_SPREAD >= NARROWEST_CELL_MAG;
  const hasSingle = points.values.length > 0 || !spreads.every(isFollowed);
  const narrowest = spreads.filter(isFollowed).reduce((a, b) => Math.min(a, b), Infinity);
  const kind = hasSingle ? 'single' : narrowest >= WIDE_SPREAD ? 'wide' : 'narrow';
  const cellMag = isHard ? stepNotAbove(narrowest * CELL_PER_SPREAD, 'hard') : smooth(kind);
  const integrated = sides.filter((side) => spreadOf(side) * CELL_PER_SPREAD >= 0.5 * cellMag);
  const values = [...points.values];
  const weights = [...points.weights];
  for (const side of sides) {
    if (integrated.includes(side)) continue;
    const nodes = sideNodes(side, NODES_OF_NARROW_SIDE[settings.threshold]);
    values.push(...nodes.values);
    weights.push(...nodes.weights);
  }
  return {
    sides: integrated,
    single: { values: Float64Array.from(values), weights: Float64Array.from(weights) },
    cellMag,
  };
}

function stepNotAbove(wanted: number, threshold: keyof typeof WIDEST_CELL_MAG): number {
  let step: number = WIDEST_CELL_MAG[threshold];
  while (step > wanted && step > NARROWEST_CELL_MAG) step /= 2;
  return step;
}
