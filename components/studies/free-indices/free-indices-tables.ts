import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

type Result = AnswerProps<'free-indices'>['result'];

const parameters = [
  ['rate', 'rate'],
  ['mass_index_per_log', 'massIndex'],
  ['semi_major_axis_index_per_log', 'semiMajorAxisIndex'],
] as const;

/** x along the columns, y along the rows of the stored plane. */
const planes = [
  ['mass_index_per_log', 'rate', 'rateByMassIndex'],
  ['semi_major_axis_index_per_log', 'rate', 'rateBySemiMajorAxisIndex'],
  ['mass_index_per_log', 'semi_major_axis_index_per_log', 'massIndexBySemiMajorAxisIndex'],
] as const;

function planeTable(
  x: string,
  y: string,
  { x: across, y: up, density }: Result['rateByMassIndex'],
) {
  return {
    name: `joint density of ${x} and ${y}`,
    columns: [x, y, 'density'],
    rows: up.flatMap((row, j) => across.map((column, i) => [column, row, density[j][i]])),
  };
}

export function freeIndicesTables({ asked, result }: AnswerProps<'free-indices'>): DataTable[] {
  return [
    {
      name: `parameters, rate as ${asked.quantity}`,
      columns: ['parameter', 'mean', 'median', 'sd', 'low_68', 'high_68', 'low_95', 'high_95'],
      rows: parameters.map(([name, key]) => {
        const { mean, median, standardDeviation, interval68, interval95 } = result[key];
        return [name, mean, median, standardDeviation, ...interval68, ...interval95];
      }),
    },
    {
      name: 'limits by level',
      columns: ['level', 'limit'],
      rows: result.levels.map(({ level, limit }) => [level, limit]),
    },
    ...parameters.map(([name, key]) => ({
      name: `marginal density of ${name}`,
      columns: [name, 'density'],
      rows: result[key].marginal.value.map((value, i) => [value, result[key].marginal.density[i]]),
    })),
    ...planes.map(([x, y, key]) => planeTable(x, y, result[key])),
  ];
}
