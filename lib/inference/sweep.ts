import type { Population } from '@/lib/population';
import { answerFromView, viewPopulation } from './answer';
import {
  answerPairs,
  type PairAnswers,
  type PairQuestion,
  requireSeparable,
  type SeparablePopulation,
} from './population-pairs';

/** What a sweep changes: one end of a range [M_Jup], [au], or an index per natural logarithm. */
export type SweepParameter =
  | 'semi-major-axis-max'
  | 'semi-major-axis-min'
  | 'mass-min'
  | 'mass-max'
  | 'mass-index'
  | 'semi-major-axis-index';

const RANGE_ENDS = {
  'semi-major-axis-max': 'semiMajorAxisMaxAu',
  'semi-major-axis-min': 'semiMajorAxisMinAu',
  'mass-min': 'massMinMjup',
  'mass-max': 'massMaxMjup',
} as const;

const isAlongMass = (parameter: SweepParameter) => parameter.startsWith('mass');

/** The limit for each value of one parameter of the population; arrays of one length. */
export interface Sweep extends PairAnswers {
  over: SweepParameter;
  value: Float64Array;
}

function requirePowerLaw(population: Population): void {
  if (population.form === 'mass-ratio' && population.semiMajorAxis.shape !== 'power-law') {
    throw new RangeError(
      'an index can be swept only of a power law; the semi-major axis follows a law of the kind ' +
        population.semiMajorAxis.shape,
    );
  }
}

function withIndex(
  population: SeparablePopulation,
  side: 'mass' | 'semiMajorAxis',
  index: number,
): SeparablePopulation {
  if (population.form === 'power-law') {
    return { ...population, [side === 'mass' ? 'massIndex' : 'semiMajorAxisIndex']: index };
  }
  if (population[side].shape !== 'power-law') {
    throw new RangeError(
      `an index can be swept only of a power law; the ${side === 'mass' ? 'mass' : 'semi-major axis'} ` +
        `follows a law of the kind ${population[side].shape}`,
    );
  }
  return { ...population, [side]: { shape: 'power-law', index } };
}

/**
 * A population with one parameter changed.
 *
 * @throws RangeError for an index of a law that has none, and for tables of systems and mass ratios
 * @example withParameter(population, 'semi-major-axis-max', 50)
 */
export function withParameter(
  population: Population,
  parameter: SweepParameter,
  value: number,
): SeparablePopulation {
  const separable = requireSeparable(population, `a sweep over ${parameter}`);
  if (parameter === 'mass-index') return withIndex(separable, 'mass', value);
  if (parameter === 'semi-major-axis-index') return withIndex(separable, 'semiMajorAxis', value);
  return { ...separable, [RANGE_ENDS[parameter]]: value };
}

/** A mass ratio's box differs from star to star: one view a value, in semi-major axis alone. */
function sweepMassRatio(question: PairQuestion, over: SweepParameter, value: Float64Array): Sweep {
  const { maps, grid, population, hostMassMsun } = question;
  if (population.form !== 'mass-ratio' || isAlongMass(over)) {
    requireSeparable(population, `a sweep over ${over}`);
  }
  if (over === 'semi-major-axis-index') requirePowerLaw(population);
  const answers = Array.from(value, (x) => {
    const changed: Population =
      over === 'semi-major-axis-index'
        ? ({ ...population, semiMajorAxis: { shape: 'power-law', index: x } } as Population)
        : ({ ...population, [RANGE_ENDS[over as keyof typeof RANGE_ENDS]]: x } as Population);
    const view = viewPopulation(maps, grid, changed, hostMassMsun);
    return {
      found: answerFromView(view, question),
      none: answerFromView(view, { ...question, detections: [] }),
    };
  });
  return {
    over,
    value,
    limit: Float64Array.from(answers, ({ found }) => found.limit),
    limitWithoutDetections: Float64Array.from(answers, ({ none }) => none.limit),
    exposure: Float64Array.from(answers, ({ found }) => found.exposure),
    detections: Int32Array.from(answers, ({ found }) => found.counted.length),
    isSetByPrior: Uint8Array.from(answers, ({ found }) => Number(found.setByPrior)),
    shareOutsideMap: Float64Array.from(answers, ({ found }) => found.shareOutsideMap),
  };
}

/**
 * The limit against one parameter of the population, with the detections and as if there were none.
 *
 * The population is normalised anew on each box; a detection counts where it lies inside.
 *
 * @param over an end of a range, or an index per natural logarithm
 * @param value of the parameter, in any order
 * @throws RangeError for a value that leaves no range, an index of a law that has none, tables of
 *   systems, masses of a mass ratio, and as `answerPairs`
 * Edges: a value whose box lies outside the maps has exposure 0 and the prior's own limit.
 * Cost: one pass over the maps; only the weights change.
 */
export function sweepLimits(
  question: PairQuestion,
  over: SweepParameter,
  value: Float64Array,
): Sweep {
  const { population } = question;
  if (population.form === 'mass-ratio' || population.form === 'systems') {
    return sweepMassRatio(question, over, value);
  }
  const changed = Array.from(value, (x) => withParameter(population, over, x));
  const answers = isAlongMass(over)
    ? answerPairs(question, changed, [population])
    : answerPairs(question, [population], changed);
  return { over, value, ...answers };
}

/** The limit over a plane of both indices, shape [mass index, semi-major axis index]. */
export interface IndexPlane extends PairAnswers {
  massIndex: Float64Array;
  semiMajorAxisIndex: Float64Array;
}

/**
 * The limit against both indices of a power law together.
 *
 * @param massIndices per d ln m
 * @param axisIndices per d ln a
 * @throws RangeError as `sweepLimits`
 */
export function sweepIndices(
  question: PairQuestion,
  massIndices: Float64Array,
  axisIndices: Float64Array,
): IndexPlane {
  const { population } = question;
  const answers = answerPairs(
    question,
    Array.from(massIndices, (index) => withParameter(population, 'mass-index', index)),
    Array.from(axisIndices, (index) => withParameter(population, 'semi-major-axis-index', index)),
  );
  return { massIndex: massIndices, semiMajorAxisIndex: axisIndices, ...answers };
}
