import { limitMap, starInfluence, sweepIndices, sweepLimits, tailLimits } from '@/lib/inference';
import { runCheckFile } from './support/check-file';
import { checkedPopulation, type PopulationInputs } from './support/check-populations';
import { publishedSum, surveyGrid } from './support/check-survey';

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
  later: {
    systematics: 'varied stars (10) come with the systematics',
  },
});
