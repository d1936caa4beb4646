import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';
import { sortRows } from './systematics-rows';

export function systematicsTables({ asked, result }: AnswerProps<'systematics'>): DataTable[] {
  const { answered, faulty } = sortRows(result.rows);
  return [
    {
      name: `limit with one assumption changed, ${asked.quantity}`,
      columns: ['change', 'limit', 'ratio', 'exposure_stars', 'stars_unchanged', 'fault'],
      rows: [
        ['this run', result.baseline, 1, asked.result.exposure, asked.result.stars, null],
        ...[...answered, ...faulty].map((row) => [
          row.label,
          row.limit,
          row.ratio,
          row.exposure,
          row.starsUnchanged,
          row.fault,
        ]),
      ],
    },
  ];
}
