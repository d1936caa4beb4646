import {
  answerQuestion,
  limitMap,
  starInfluence,
  sweepIndices,
  sweepLimits,
  tailLimits,
} from '@/lib/inference';
import {
  type AgeLaw,
  type SensitivitySettings,
  type StarInputs,
  varyStar,
} from '@/lib/sensitivity';
import { runCheckFile } from './support/check-file';
import { checkedPopulation, type PopulationInputs } from './support/check-populations';
import { computedMaps, publishedSum, surveyGrid } from './support/check-survey';

interface FlatInputs {
  max: number;
  level: number;
  population: PopulationInputs;
}

const asked = ({ max, level }: Pick<FlatInputs, 'max' | 'level'>) => ({
  maps: publishedSum('full'),
  grid: surveyGrid,
  likelihood: 'mean-number' as const,
  prior: { law: 'uniform' as const, max },
  level,
});

const askedOf = (inputs: FlatInputs) => ({
  ...asked(inputs),
  population: checkedPopulation(inputs.population),
  detections: [],
});

/** Rows of an array of shape [row, column]. */
function rowsOf(values: Float64Array, columns: number): number[][] {
  return Array.from({ length: values.length / columns }, (_, row) =>
    Array.from(values.subarray(row * columns, (row + 1) * columns)),
  );
}

type Change = [star?: (star: StarInputs) => StarInputs, settings?: Partial<SensitivitySettings>];

function limitWith(inputs: FlatInputs & { option: string }, ...[change, settings]: Change): number {
  const maps = computedMaps(inputs.option, change, { ageNodesPerSide: undefined, ...settings });
  return answerQuestion({ ...askedOf(inputs), maps }).limit;
}

runCheckFile('survey-summaries', {
  runners: {
    'limit map per cell': (inputs: FlatInputs) =>
      rowsOf(limitMap(asked(inputs)).limit, surveyGrid.semiMajorAxisAu.length),
    'leave-one-out limits': ({ max, level, completeness_per_star }) => {
      const { limit, without } = starInfluence(
        {
          likelihood: 'mean-number',
          completeness: Float64Array.from(completeness_per_star as number[]),
          detectedStars: [],
          prior: { law: 'uniform', max },
        },
        level,
      );
      return {
        all: limit,
        without_star: without.map((one) => one?.limit),
        relative_change: without.map((one) => one?.relativeChange),
      };
    },
    // Exact ages, as a run has them: the file's own five nodes lie within its tolerance of 1 %.
    systematics: (inputs: FlatInputs & { option: string }) => {
      const limitOf = (...changed: Change) => limitWith(inputs, ...changed);
      const exact = ({ age, distance, ...star }: StarInputs): StarInputs => ({
        ...star,
        age: { medianMyr: (age as AgeLaw).medianMyr },
        distance: { ...distance, ...('distancePc' in distance ? { errorPc: 0 } : { errorMas: 0 }) },
      });
      const moved = (kind: 'ages' | 'distances', sigma: -1 | 1) =>
        limitOf((star) => varyStar(star, { kind, sigma }));
      return {
        baseline: limitOf(),
        'ages at the lower bound': moved('ages', -1),
        'ages at the upper bound': moved('ages', 1),
        'distances one sigma nearer': moved('distances', -1),
        'distances one sigma farther': moved('distances', 1),
        'hard threshold': limitOf(undefined, { threshold: 'hard' }),
        'circular orbits': limitOf(undefined, { eccentricity: { law: 'circular' } }),
        'no age or distance errors': limitOf(exact),
      };
    },
    'tail-cumulative limits': (inputs: FlatInputs & { corners_mjup_au: [number, number][] }) =>
      inputs.corners_mjup_au.map(
        ([mass, axis]) =>
          tailLimits(askedOf(inputs), Float64Array.of(mass), Float64Array.of(axis)).limit[0],
      ),
    'sweep of the outer cutoff': (inputs: FlatInputs & { outer_au: number[] }) =>
      sweepLimits(askedOf(inputs), 'semi-major-axis-max', Float64Array.from(inputs.outer_au)).limit,
    'sweep of the indices': (
      inputs: FlatInputs & { mass_index: number[]; axis_index: number[] },
    ) => {
      const masses = Float64Array.from(inputs.mass_index);
      const axes = Float64Array.from(inputs.axis_index);
      return rowsOf(sweepIndices(askedOf(inputs), masses, axes).limit, axes.length);
    },
  },
});
