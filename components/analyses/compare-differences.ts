import { formatIndex } from '@/components/populations/law-notation';
import { countOf } from '@/components/runs/level-table';
import {
  describeBackground,
  describeCandidates,
  describeLevel,
  describePopulation,
  describePrior,
} from '@/lib/inference';
import { fromLogIndex } from '@/lib/population';
import { formatRange } from '@/lib/quantities/display';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { isPlainPowerLaw, type ListedDefinition } from '@/lib/schemas/populations';
import type { RunInputs, RunResult, RunView } from '@/lib/schemas/runs';

/** One analysis of a comparison, with everything that its number rests on. */
export interface ComparedRun {
  key: string;
  name: string;
  run: RunView;
  inputs: RunInputs;
  result: RunResult;
  recipe: AnalysisRecipe;
  definition: ListedDefinition;
}

export interface ComparedInput {
  name: string;
  a: string;
  b: string;
  /** A difference by which the two limits answer different questions. */
  changesQuestion: boolean;
}

function massWords(definition: ListedDefinition): string {
  return definition.form === 'mass-ratio'
    ? `${formatRange(definition.massRatioMin, definition.massRatioMax, '')} of the star's mass`
    : formatRange(definition.massMinMjup, definition.massMaxMjup, 'MJ');
}

/** Index by index where both are plain power laws, else each law in its words. */
function lawRows(
  { definition: one }: ComparedRun,
  { definition: other }: ComparedRun,
  row: (name: string, words: (run: ComparedRun) => string) => ComparedInput,
): ComparedInput[] {
  if (!isPlainPowerLaw(one) || !isPlainPowerLaw(other)) {
    return [row('Law', ({ definition }) => describePopulation(definition))];
  }
  const index = (field: 'massIndex' | 'semiMajorAxisIndex') => (run: ComparedRun) =>
    isPlainPowerLaw(run.definition)
      ? formatIndex(fromLogIndex(run.definition[field], 'linear'))
      : '';
  return [
    row('Mass index α', index('massIndex')),
    row('Axis index β', index('semiMajorAxisIndex')),
  ];
}

/** What was done with candidates without an answer. */
function candidateWords({ recipe, result }: ComparedRun): string {
  if (!recipe.candidates || recipe.detections === 'none') return 'set aside';
  return result.candidates ? describeCandidates(result.candidates) : 'none inside the ranges';
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
    row('Candidates', candidateWords),
    row('Background', ({ recipe }) =>
      recipe.background === undefined ? 'none' : describeBackground(recipe.background),
    ),
    row('Planet mass', ({ definition }) => massWords(definition), true),
    row(
      'Semi-major axis',
      ({ definition: d }) => formatRange(d.semiMajorAxisMinAu, d.semiMajorAxisMaxAu, 'AU'),
      true,
    ),
    ...lawRows(a, b, row),
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
