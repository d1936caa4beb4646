import { formatIndex } from '@/components/populations/law-notation';
import { countOf } from '@/components/runs/level-table';
import { describeLevel, describePrior } from '@/lib/inference';
import { fromLogIndex } from '@/lib/population';
import { formatRange } from '@/lib/quantities/display';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { PopulationDefinition } from '@/lib/schemas/populations';
import type { RunInputs, RunResult, RunView } from '@/lib/schemas/runs';

/** One analysis of a comparison, with everything that its number rests on. */
export interface ComparedRun {
  key: string;
  name: string;
  run: RunView;
  inputs: RunInputs;
  result: RunResult;
  recipe: AnalysisRecipe;
  definition: PopulationDefinition;
}

export interface ComparedInput {
  name: string;
  a: string;
  b: string;
  /** A difference by which the two limits answer different questions. */
  changesQuestion: boolean;
}

/** Every input in words, in the order in which a reader asks for it. */
export function compareInputs(a: ComparedRun, b: ComparedRun): ComparedInput[] {
  const row = (
    name: string,
    words: (run: ComparedRun) => string,
    changesQuestion = false,
  ): ComparedInput => ({ name, a: words(a), b: words(b), changesQuestion });
  return [
    row('Detections', (side) =>
      side.recipe.detections === 'none'
        ? 'none counted'
        : `${countOf(side.result.counted.length)} counted`,
    ),
    row(
      'Planet mass',
      ({ definition: d }) => formatRange(d.massMinMjup, d.massMaxMjup, 'MJ'),
      true,
    ),
    row(
      'Semi-major axis',
      ({ definition: d }) => formatRange(d.semiMajorAxisMinAu, d.semiMajorAxisMaxAu, 'AU'),
      true,
    ),
    row('Mass index α', ({ definition: d }) => formatIndex(fromLogIndex(d.massIndex, 'linear'))),
    row('Axis index β', ({ definition: d }) =>
      formatIndex(fromLogIndex(d.semiMajorAxisIndex, 'linear')),
    ),
    row('Level', ({ result }) => describeLevel(result.credibleLevel), true),
    row(
      'Likelihood',
      ({ result }) =>
        result.quantity === 'host_fraction' ? 'host fraction' : 'planets per star (Poisson)',
      true,
    ),
    row('Prior', ({ recipe, result }) => describePrior(recipe.prior, result.quantity)),
    row('Stars', ({ result }) => String(result.stars)),
    row('Surveys', ({ inputs }) => inputs.surveys.map((survey) => survey.name).join(', ')),
    row('Maps', ({ inputs }) => sampleWords(inputs, a.inputs)),
    row('Stars in several surveys', ({ inputs }) => inputs.combination),
    row('Cooling', ({ inputs }) => inputs.cooling),
    row('Eccentricity', ({ inputs }) => inputs.eccentricity),
    row('Threshold', ({ inputs }) => inputs.threshold),
    row('Engine', ({ inputs }) => `version ${inputs.engineVersion}`),
  ];
}

/** How many of the stars have the same map in the first run. */
function sampleWords(inputs: RunInputs, first: RunInputs): string {
  const known = new Map(first.stars.map((star) => [star.starId, star.mapDigest]));
  const other = inputs.stars.filter((star) => known.get(star.starId) !== star.mapDigest).length;
  return other === 0 ? 'as in A' : `${other} other than in A`;
}

export interface LevelPair {
  level: number;
  a: number;
  b: number;
}

/** Limits of both at the levels that both tables hold. */
export function pairLevels(a: ComparedRun, b: ComparedRun): LevelPair[] {
  const own = (side: ComparedRun, row: RunResult['levels'][number]) =>
    side.result.quantity === 'host_fraction' ? row.hostFraction : row.meanNumber;
  return a.result.levels.flatMap((row) => {
    const other = b.result.levels.find((one) => Math.abs(one.level - row.level) < 1e-9);
    const [first, second] = [own(a, row), other ? own(b, other) : null];
    return first === null || second === null ? [] : [{ level: row.level, a: first, b: second }];
  });
}
