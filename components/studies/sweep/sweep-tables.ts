import type { DataTable } from '@/components/charts/data-table';
import { sweptParameters } from '@/lib/inference';
import type { AnswerProps } from '../kind-entry';

const suffix = { AU: '_au', MJ: '_mjup', index: '_per_log' };

export function sweepTables({ asked, result }: AnswerProps<'sweep'>): DataTable[] {
  const { plane, over } = result;
  if (plane) {
    return [
      {
        name: `limit over both indices, ${asked.quantity}`,
        columns: ['mass_index_per_log', 'semi_major_axis_index_per_log', 'limit'],
        rows: plane.massIndex.flatMap((mass, row) =>
          plane.semiMajorAxisIndex.map((axis, column) => [mass, axis, plane.limit[row][column]]),
        ),
      },
    ];
  }
  return [
    {
      name: `limit along one parameter, ${asked.quantity}`,
      columns: [
        `${over.replaceAll('-', '_')}${suffix[sweptParameters[over].unit]}`,
        'limit',
        'limit_no_detection',
        'detections',
        'exposure_stars',
        'is_set_by_prior',
      ],
      rows: result.value.map((value, i) => [
        value,
        result.limit[i],
        result.limitZero[i],
        result.detections[i],
        result.exposure[i],
        result.isSetByPrior[i],
      ]),
    },
  ];
}
