import { viewPopulation } from '@/lib/inference';
import type { IndexSummary, JointDensity, ParameterSummary } from '@/lib/inference/index-summaries';
import { summariseIndices } from '@/lib/inference/index-summaries';
import { upperLimit } from '@/lib/inference/intervals';
import { freeIndices } from '@/lib/inference/settled-indices';
import { populationBox } from '@/lib/population';
import type { ResultOf } from '@/lib/schemas/study-results';
import type { SettingsOf } from '@/lib/schemas/study-settings';
import type { RunQuestion } from './run-question';

export interface FreeIndicesInput {
  question: RunQuestion;
  settings: SettingsOf<'free-indices'>;
  levels: number[];
  limitFixed: number;
}

type Result = ResultOf<'free-indices'>;

const plainParameter = ({ marginal, ...rest }: ParameterSummary): Result['rate'] => ({
  ...rest,
  marginal: { value: [...marginal.value], density: [...marginal.density] },
});

const plainPlane = ({ x, y, density }: JointDensity): Result['rateByMassIndex'] => ({
  x: [...x],
  y: [...y],
  density: Array.from(y, (_, row) => [...density.subarray(row * x.length, (row + 1) * x.length)]),
});

/** The run's question with both indices free, summed out and shown. */
export function answerFreeIndices(input: FreeIndicesInput): Result {
  const { question, settings, levels, limitFixed } = input;
  const { maps, grid, population, hostMassMsun, likelihood, prior, detections, level } = question;
  const { rateScale } = viewPopulation(maps, grid, population, hostMassMsun);
  const { massIndex, semiMajorAxisIndex } = settings;
  const settled = freeIndices(
    {
      maps,
      grid,
      box: populationBox(population),
      indices: { massIndex, semiMajorAxisIndex },
      likelihood,
      prior,
      detections,
      ...(rateScale !== null && { rateScale }),
    },
    level,
  );
  const { rate } = settled.posterior;
  const summary: IndexSummary = summariseIndices(settled.posterior);
  return {
    kind: 'free-indices',
    limit: settled.limit,
    limitFixed,
    levels: levels.map((one) => ({ level: one, limit: upperLimit(rate, one) })),
    rate: plainParameter(summary.rate),
    massIndex: plainParameter(summary.massIndex),
    semiMajorAxisIndex: plainParameter(summary.semiMajorAxisIndex),
    rateByMassIndex: plainPlane(summary.rateByMassIndex),
    rateBySemiMajorAxisIndex: plainPlane(summary.rateBySemiMajorAxisIndex),
    massIndexBySemiMajorAxisIndex: plainPlane(summary.massIndexBySemiMajorAxisIndex),
    correlations: summary.correlations,
    logEvidence: Number.isFinite(rate.logEvidence) ? rate.logEvidence : null,
    nodes: settled.nodes,
    movedBy: settled.limitMovedBy,
    notes: settled.notes,
  };
}
