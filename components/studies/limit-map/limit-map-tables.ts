import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

export function limitMapTables({ asked, result }: AnswerProps<'limit-map'>): DataTable[] {
  return [
    {
      name: `limit at each place, ${asked.quantity}`,
      columns: [
        'mass_mjup',
        'semi_major_axis_au',
        'limit',
        'summed_stars',
        'is_set_by_prior',
        ...(result.tail ? ['limit_beyond'] : []),
      ],
      rows: result.massMjup.flatMap((mass, row) =>
        result.semiMajorAxisAu.map((axis, column) => [
          mass,
          axis,
          result.limit[row][column],
          result.summed[row][column],
          result.isSetByPrior[row][column],
          ...(result.tail ? [result.tail[row][column]] : []),
        ]),
      ),
    },
  ];
}
