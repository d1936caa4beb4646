import { viewPopulation } from '@/lib/inference';
import { limitMap } from '@/lib/inference/limit-map';
import { tailLimits } from '@/lib/inference/tail-limits';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { MapGrid } from '@/lib/sensitivity';
import type { RunQuestion } from './run-question';

export interface LimitMapInput {
  question: RunQuestion;
  tailCumulative: boolean;
}

type Result = ResultOf<'limit-map'>;

function rowsOf<Value>(grid: MapGrid, values: ArrayLike<number>, read: (value: number) => Value) {
  const columns = grid.semiMajorAxisAu.length;
  return Array.from(grid.massMjup, (_, row) =>
    Array.from(grid.semiMajorAxisAu, (_, column) => read(values[row * columns + column])),
  );
}

/** Laid on the run's grid; corners outside the population's ranges have no tail. */
function answerTail(question: RunQuestion): Result['tail'] {
  const { grid } = question;
  const tail = tailLimits(question);
  const rowOf = new Map([...tail.massMjup].map((mass, i) => [mass, i]));
  const columnOf = new Map([...tail.semiMajorAxisAu].map((axis, j) => [axis, j]));
  return Array.from(grid.massMjup, (mass) =>
    Array.from(grid.semiMajorAxisAu, (axis) => {
      const [row, column] = [rowOf.get(mass), columnOf.get(axis)];
      if (row === undefined || column === undefined) return null;
      const limit = tail.limit[row * tail.semiMajorAxisAu.length + column];
      return Number.isFinite(limit) ? limit : null;
    }),
  );
}

/** The limit with no detection and all companions at each node, and for what lies beyond it. */
export function answerLimitMap({ question, tailCumulative }: LimitMapInput): Result {
  const { maps, grid, population, hostMassMsun, likelihood, prior, level } = question;
  const { rateScale } = viewPopulation(maps, grid, population, hostMassMsun);
  const scale = rateScale ?? undefined;
  const map = limitMap({ maps, grid, likelihood, prior, level, rateScale: scale });
  const notes = ['Each node stands for itself: the map is no joint statement about all of them'];
  if (question.detections.length > 0) {
    notes.push('It holds for companions unlike those that were found');
  }
  if (tailCumulative && (question.candidates !== null || question.background !== null)) {
    notes.push(
      'Beyond each node confirmed companions count, without open candidates or background',
    );
  }
  return {
    kind: 'limit-map',
    massMjup: [...grid.massMjup],
    semiMajorAxisAu: [...grid.semiMajorAxisAu],
    limit: rowsOf(grid, map.limit, (value) => value),
    summed: rowsOf(grid, map.summed, (value) => value),
    isSetByPrior: rowsOf(grid, map.isSetByPrior, (value) => value === 1),
    tail: tailCumulative ? answerTail(question) : null,
    notes,
  };
}
