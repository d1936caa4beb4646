import {
  type SweepParameter,
  sweepIndices,
  sweepLimits,
  withParameter,
} from '@/lib/inference/sweep';
import { linearAxis, logSpacedAxis } from '@/lib/numerics/grid';
import type { Population } from '@/lib/population';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf } from '@/lib/schemas/study-settings';
import { answerRunQuestion, type RunQuestion } from './run-question';

export interface SweepInput {
  question: RunQuestion;
  settings: SettingsOf<'sweep'>;
}

type Result = ResultOf<'sweep'>;
type Points = Pick<
  Result,
  'value' | 'limit' | 'limitZero' | 'exposure' | 'detections' | 'isSetByPrior'
>;

/** Open candidates and a background are no part of the pass over all values at once. */
const isPlain = ({ candidates, background }: RunQuestion) =>
  candidates === null && background === null;

const withNone = (question: RunQuestion): RunQuestion => ({
  ...question,
  detections: [],
  candidates: null,
});

function changed(population: Population, over: SweepParameter, value: number): Population {
  if (population.form !== 'mass-ratio') return withParameter(population, over, value);
  if (over === 'semi-major-axis-min') return { ...population, semiMajorAxisMinAu: value };
  if (over === 'semi-major-axis-max') return { ...population, semiMajorAxisMaxAu: value };
  return { ...population, semiMajorAxis: { shape: 'power-law', index: value } };
}

function oneByOne(question: RunQuestion, over: SweepParameter, values: Float64Array): Points {
  const answers = Array.from(values, (value) => {
    const asked = { ...question, population: changed(question.population, over, value) };
    return { found: answerRunQuestion(asked), none: answerRunQuestion(withNone(asked)) };
  });
  return {
    value: [...values],
    limit: answers.map(({ found }) => found.limit),
    limitZero: answers.map(({ none }) => none.limit),
    exposure: answers.map(({ found }) => found.exposure),
    detections: answers.map(({ found }) => found.posterior.detections),
    isSetByPrior: answers.map(({ found }) => found.isSetByPrior),
  };
}

function allAtOnce(question: RunQuestion, over: SweepParameter, values: Float64Array): Points {
  const swept = sweepLimits(question, over, values);
  return {
    value: [...values],
    limit: [...swept.limit],
    limitZero: [...swept.limitWithoutDetections],
    exposure: [...swept.exposure],
    detections: [...swept.detections],
    isSetByPrior: Array.from(swept.isSetByPrior, (flag) => flag === 1),
  };
}

/** Where a companion lies in ranges of which its star shows nothing, there is no limit to tell. */
function keepAnswered(points: Points): { points: Points; notes: string[] } {
  const isAnswered = (i: number) =>
    Number.isFinite(points.limit[i]) && Number.isFinite(points.limitZero[i]);
  const kept = [...points.value.keys()].filter(isAnswered);
  const left = points.value.length - kept.length;
  if (left === 0) return { points, notes: [] };
  const pick = <Value>(values: Value[]) => kept.map((i) => values[i]);
  return {
    points: {
      value: pick(points.value),
      limit: pick(points.limit),
      limitZero: pick(points.limitZero),
      exposure: pick(points.exposure),
      detections: pick(points.detections),
      isSetByPrior: pick(points.isSetByPrior),
    },
    notes: [`${left} of ${points.value.length} values have no limit: nothing can be seen there`],
  };
}

/** Both indices together; the diagonal of equal steps stands for the curve. */
function answerPlane(question: RunQuestion, values: Float64Array): NonNullable<Result['plane']> {
  const plain = isPlain(question) ? sweepIndices(question, values, values) : null;
  const limitAt = (row: number, column: number) => {
    if (plain) return plain.limit[row * values.length + column];
    const inMass = withParameter(question.population, 'mass-index', values[row]);
    const population = withParameter(inMass, 'semi-major-axis-index', values[column]);
    return answerRunQuestion({ ...question, population }).limit;
  };
  return {
    massIndex: [...values],
    semiMajorAxisIndex: [...values],
    limit: Array.from(values, (_, row) => Array.from(values, (_, column) => limitAt(row, column))),
  };
}

function alongDiagonal(question: RunQuestion, values: Float64Array): Points {
  const parts = Array.from(values, (value) => {
    const inMass = withParameter(question.population, 'mass-index', value);
    return oneByOne(
      { ...question, population: inMass },
      'semi-major-axis-index',
      Float64Array.of(value),
    );
  });
  const join = <Key extends keyof Points>(key: Key) =>
    parts.flatMap((part) => part[key] as unknown[]) as Points[Key];
  return {
    value: [...values],
    limit: join('limit'),
    limitZero: join('limitZero'),
    exposure: join('exposure'),
    detections: join('detections'),
    isSetByPrior: join('isSetByPrior'),
  };
}

/** The limit against one parameter of the population, or against both indices. */
export function answerSweep({ question, settings }: SweepInput): Result {
  const { over, from, to, count } = settings;
  const isIndex = over.endsWith('index') || over === 'both-indices';
  const values = isIndex ? linearAxis(from, to, count) : logSpacedAxis(from, to, count);
  if (over === 'both-indices') {
    const { points, notes } = keepAnswered(alongDiagonal(question, values));
    return { kind: 'sweep', over, ...points, plane: answerPlane(question, values), notes };
  }
  const sweep = isPlain(question) ? allAtOnce : oneByOne;
  const { points, notes } = keepAnswered(sweep(question, over, values));
  return { kind: 'sweep', over, ...points, plane: null, notes };
}
