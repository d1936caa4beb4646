import {
  answerPairs,
  type PairAnswers,
  type PairQuestion,
  requireSeparable,
} from './population-pairs';

/** Limits for companions at least as heavy and as wide as each corner. */
export interface TailLimits {
  massMjup: Float64Array;
  semiMajorAxisAu: Float64Array;
  /** Shape [mass, semiMajorAxis]; NaN where nothing of the tail can be seen. */
  limit: Float64Array;
  exposure: Float64Array;
  /** Detections inside each tail. */
  detections: Int32Array;
}

/** Nodes of an axis inside a range and below the axis's end, where a tail is left. */
function cornersInside(nodes: Float64Array, min: number, max: number): Float64Array {
  const end = Math.min(max, nodes[nodes.length - 1]);
  return nodes.filter((x) => x >= min && x < end);
}

/**
 * Upper limits for the part of a population beyond each corner (m, a).
 *
 * The population is cut to [m, m2] x [a, a2] and normalised anew; the detections inside count.
 *
 * @param question of a population with a law along each axis
 * @param masses corners [M_Jup], default the grid's nodes inside the ranges
 * @param axes corners [au], likewise
 * @throws RangeError for corners outside the ranges, tables of systems and mass ratios, and as
 *   `answerPairs`
 * Cost: `answerPairs` with one set of weights a corner on each axis.
 */
export function tailLimits(
  question: PairQuestion,
  masses?: Float64Array,
  axes?: Float64Array,
): TailLimits {
  const population = requireSeparable(question.population, 'a tail');
  const { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu } = population;
  const { grid } = question;
  const massMjup = masses ?? cornersInside(grid.massMjup, massMinMjup, massMaxMjup);
  const semiMajorAxisAu =
    axes ?? cornersInside(grid.semiMajorAxisAu, semiMajorAxisMinAu, semiMajorAxisMaxAu);
  for (const m of massMjup) {
    if (!(m >= massMinMjup && m < massMaxMjup)) {
      throw new RangeError(`a corner at ${m} M_Jup lies outside ${massMinMjup} to ${massMaxMjup}`);
    }
  }
  for (const a of semiMajorAxisAu) {
    if (!(a >= semiMajorAxisMinAu && a < semiMajorAxisMaxAu)) {
      throw new RangeError(
        `a corner at ${a} au lies outside ${semiMajorAxisMinAu} to ${semiMajorAxisMaxAu}`,
      );
    }
  }
  const corners = { massMjup, semiMajorAxisAu };
  if (massMjup.length === 0 || semiMajorAxisAu.length === 0) {
    const none = new Float64Array(0);
    return { ...corners, limit: none, exposure: none, detections: new Int32Array(0) };
  }
  const answers: PairAnswers = answerPairs(
    question,
    Array.from(massMjup, (m) => ({ ...population, massMinMjup: m })),
    Array.from(semiMajorAxisAu, (a) => ({ ...population, semiMajorAxisMinAu: a })),
  );
  const { exposure, detections } = answers;
  const limit = answers.limit.map((one, at) => (exposure[at] > 0 ? one : Number.NaN));
  return { ...corners, limit, exposure, detections };
}
