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
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import type { SideAddress } from './address';

/** One side of a comparison, with everything that its number rests on. */
export interface ComparedRun {
  letter: string;
  address: SideAddress;
  /** "A-31" where the run is the newest one, "A-31, run 2" otherwise. */
  name: string;
  title: string;
  run: DrawnRun;
  inputs: DrawnInputs;
  /** With its detections set aside where the side is a twin. */
  result: DrawnResult;
  recipe: AnalysisRecipe;
  definition: ListedDefinition;
}

export interface ComparedInput {
  name: string;
  /** In the order of the sides. */
  values: string[];
  /** A difference by which the limits answer different questions. */
  changesQuestion: boolean;
}

export const isSameInAll = ({ values }: ComparedInput): boolean =>
  values.every((value) => value === values[0]);

function massWords(definition: ListedDefinition): string {
  return definition.form === 'mass-ratio'
    ? `${formatRange(definition.massRatioMin, definition.massRatioMax, '')} of the star's mass`
    : formatRange(definition.massMinMjup, definition.massMaxMjup, 'MJ');
}

/** Index by index where all are plain power laws, else each law in its words. */
function lawRows(
  sides: ComparedRun[],
  row: (name: string, words: (run: ComparedRun) => string) => ComparedInput,
): ComparedInput[] {
  if (!sides.every(({ definition }) => isPlainPowerLaw(definition))) {
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
export function compareInputs(sides: ComparedRun[]): ComparedInput[] {
  const row = (
    name: string,
    words: (run: ComparedRun) => string,
    changesQuestion = false,
  ): ComparedInput => ({ name, values: sides.map(words), changesQuestion });
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
    ...lawRows(sides, row),
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
    row('Maps', ({ inputs }) => sampleWords(inputs, sides[0].inputs)),
    row('Stars in several surveys', ({ inputs }) => inputs.combination),
    row('Cooling', ({ inputs }) => inputs.cooling),
    row('Eccentricity', ({ inputs }) => inputs.eccentricity),
    row('Threshold', ({ inputs }) => inputs.threshold),
    row('Engine', ({ inputs }) => engineWords(inputs)),
  ];
}

/** Which engine computed, and which made the maps where it was another. */
function engineWords({ engineVersion, mapEngines = [] }: DrawnInputs): string {
  const isOne = mapEngines.every((made) => made === engineVersion);
  return `version ${engineVersion}${isOne ? '' : `, maps of ${mapEngines.join(' and ')}`}`;
}

/** How many of the stars have a map of other values than in the first run. */
export function sampleWords(inputs: DrawnInputs, first: DrawnInputs): string {
  const known = new Map(first.stars.map((star) => [star.starId, star.mapChecksum]));
  const other = inputs.stars.filter((star) => known.get(star.starId) !== star.mapChecksum).length;
  return other === 0 ? 'as in A' : `${other} other than in A`;
}

/** What the warning of a comparison begins with; undefined where all ask the same question. */
export function otherQuestions(differing: ComparedInput[]): string | undefined {
  const names = differing
    .filter((row) => row.changesQuestion)
    .map(({ name }) => name.toLowerCase());
  if (names.length === 0) return undefined;
  const verb = names.length === 1 ? 'differs' : 'differ';
  return `The limits answer different questions: ${names.join(', ')} ${verb}.`;
}

export interface ComparedLevel {
  level: number;
  /** In the order of the sides; null where a side has no limit of its own quantity there. */
  limits: (number | null)[];
}

/** Limits of all sides at the levels that every table holds. */
export function limitsByLevel(sides: ComparedRun[]): ComparedLevel[] {
  return sides[0].result.levels.flatMap(({ level }) => {
    const rows = sides.map(({ result }) =>
      result.levels.find((one) => Math.abs(one.level - level) < 1e-9),
    );
    if (rows.some((row) => row === undefined)) return [];
    const limits = rows.map((row, side) => {
      if (!row) return null;
      return sides[side].result.quantity === 'host_fraction' ? row.hostFraction : row.meanNumber;
    });
    return [{ level, limits }];
  });
}

/** The same run as if nothing had been counted: the run recorded that answer beside its own. */
export function withoutDetections(result: DrawnResult): DrawnResult {
  return {
    ...result,
    answer: result.zero,
    counted: [],
    levels: result.levels.map((row) => ({
      ...row,
      hostFraction: row.hostFractionZero,
      meanNumber: row.meanNumberZero,
    })),
  };
}
