import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

export function agesCoolingTables({ asked, result }: AnswerProps<'ages-cooling'>): DataTable[] {
  return [
    {
      name: `limit under ages and cooling models, ${asked.quantity}`,
      columns: [
        'cooling_model',
        'start',
        'age_shift_sigma',
        'limit',
        'exposure_stars',
        'stars_unchanged',
        'fault',
      ],
      rows: result.models.flatMap(({ name, startCondition, shifts }) =>
        shifts.map((row, i) => [
          name,
          startCondition,
          result.ageShifts[i],
          row.limit,
          row.exposure,
          row.starsUnchanged,
          row.fault,
        ]),
      ),
    },
  ];
}
