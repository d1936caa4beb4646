import {
  antiderivative,
  chebyshevNodes,
  coefficients,
  evaluateSeries,
  NODES,
  nodeWeights,
} from './chebyshev';
import type { CheckedQuestion } from './checked-question';
import { logNoDetection } from './no-detection';
import type { PriorLaw } from './prior-law';
import { NO_DATA, stretchesOf } from './product';

/** ln density below its peak at which a panel no longer counts. */
const NEGLIGIBLE = -45;

/** Where the truth lies in the posterior of one invented survey, and the posterior's median. */
export interface Placed {
  /** Posterior probability below the truth. */
  below: number;
  median: number;
}

/**
 * Panels of each piece of the support: fine enough for the narrowest posterior of so many stars.
 *
 * A prior that is a power on a piece asks for no more than the fall of the likelihood does; one that
 * runs over decades, or is known as numbers alone, for more.
 */
function panelsFor(completeness: Float64Array, { support, logNorm }: PriorLaw): number {
  const exposure = completeness.reduce((sum, c) => sum + c, 0);
  const isPlain = support[0] === 0 && logNorm !== 'numerical';
  const wanted = isPlain
    ? 6 + 0.1 * exposure
    : Math.max(16, 2 * Math.sqrt(exposure) + 0.15 * exposure);
  return Math.min(256, Math.ceil(wanted));
}

/**
 * Posteriors of the host fraction for many outcomes of one sample.
 *
 * What no outcome changes - prior, and the product of 1 - f C_j over all stars - is put on fixed
 * places once, with a table of ln f - ln(1 - f C_j) per star; an outcome adds the rows of its stars.
 *
 * @param question completeness per star, prior; detections are not used
 * @returns where a truth x lies given the stars with a detection; x in units of the largest fraction
 * Accuracy: 1e-7 of the probability (compared with `ratePosterior` in the tests). Memory: one number
 *   per star and place.
 */
export function fractionPlacer(
  question: Pick<CheckedQuestion, 'completeness'>,
  law: PriorLaw,
): (detected: readonly number[], truth: number) => Placed {
  const { completeness } = question;
  const stretches = stretchesOf(law, NO_DATA);
  const each = law.breaks === undefined ? panelsFor(completeness, law) : 1;
  const count = stretches.length * each;
  const size = count * NODES;
  const base = new Float64Array(size);
  const logX = new Float64Array(size);
  const place = new Float64Array(size);
  for (let panel = 0; panel < count; panel++) {
    const stretch = stretches[Math.floor(panel / each)];
    for (let j = 0; j < NODES; j++) {
      const v = (positionOf(panel) + 0.5 * (1 + chebyshevNodes[j])) / each;
      const i = panel * NODES + j;
      const x = stretch.toX(v);
      place[i] = x;
      logX[i] = Math.log(x);
      base[i] = stretch.logDensity(v) + logNoDetection(x, completeness);
    }
  }
  const rows = new Array<Float64Array | undefined>(completeness.length).fill(undefined);
  const rowOf = (star: number) => {
    const known = rows[star];
    if (known) return known;
    const c = completeness[star];
    const row = new Float64Array(size);
    for (let i = 0; i < size; i++) row[i] = logX[i] - Math.log(1 - c * place[i]);
    rows[star] = row;
    return row;
  };

  /** Panels run upwards in x; those of a reversed piece downwards in v. */
  function positionOf(panel: number): number {
    const within = panel % each;
    return stretches[Math.floor(panel / each)].isReversed ? each - 1 - within : within;
  }

  const logs = new Float64Array(size);
  /** Density at the places, in units of its peak; a panel without mass keeps what it had. */
  const density = new Float64Array(size);
  const masses = new Float64Array(count);

  function massOf(panel: number, peak: number): number {
    let sum = 0;
    for (let j = 0, i = panel * NODES; j < NODES; j++, i++) {
      density[i] = Math.exp(logs[i] - peak);
      sum += nodeWeights[j] * density[i];
    }
    return 0.5 * sum;
  }

  const integralOf = (panel: number) =>
    antiderivative(coefficients(density.subarray(panel * NODES, (panel + 1) * NODES)), 0.5);

  function shareBelow(panel: number, x: number): number {
    const at = Math.floor(panel / each);
    const { toV, isReversed } = stretches[at];
    const t = 2 * (toV(x) * each - positionOf(panel)) - 1;
    const inside = evaluateSeries(integralOf(panel), Math.min(1, Math.max(-1, t)));
    return isReversed ? masses[panel] - inside : inside;
  }

  function panelAt(x: number): number {
    let at = 0;
    while (at < stretches.length - 1 && x >= stretches[at].to) at++;
    const within = Math.min(each - 1, Math.max(0, Math.floor(stretches[at].toV(x) * each)));
    return at * each + (stretches[at].isReversed ? each - 1 - within : within);
  }

  function medianOf(total: number): number {
    let before = 0;
    let panel = 0;
    while (panel < count - 1 && before + masses[panel] < 0.5 * total) before += masses[panel++];
    const { toX, isReversed } = stretches[Math.floor(panel / each)];
    const wanted = 0.5 * total - before;
    const integral = integralOf(panel);
    let [low, high] = [-1, 1];
    for (let step = 0; step < 40; step++) {
      const t = 0.5 * (low + high);
      const inside = evaluateSeries(integral, t);
      const isBelow = isReversed ? masses[panel] - inside > wanted : inside < wanted;
      if (isBelow) low = t;
      else high = t;
    }
    return toX((positionOf(panel) + 0.5 * (1 + low)) / each);
  }

  return (detected, truth) => {
    logs.set(base);
    for (const star of detected) {
      const row = rowOf(star);
      for (let i = 0; i < size; i++) logs[i] += row[i];
    }
    let peak = Number.NEGATIVE_INFINITY;
    for (let i = 0; i < size; i++) if (logs[i] > peak) peak = logs[i];
    let total = 0;
    let below = 0;
    const [low, top] = law.support;
    const truthPanel = panelAt(truth);
    for (let panel = 0; panel < count; panel++) {
      let reach = Number.NEGATIVE_INFINITY;
      for (let i = panel * NODES; i < (panel + 1) * NODES; i++) {
        if (logs[i] > reach) reach = logs[i];
      }
      masses[panel] = reach - peak > NEGLIGIBLE ? massOf(panel, peak) : 0;
      if (panel < truthPanel) below += masses[panel];
      total += masses[panel];
    }
    if (masses[truthPanel] > 0 && truth > low && truth < top) {
      below += shareBelow(truthPanel, truth);
    } else if (truth >= top) below = total;
    return { below: Math.min(1, Math.max(0, below / total)), median: medianOf(total) };
  };
}
