import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

export function countsTables({ result }: AnswerProps<'counts'>): DataTable[] {
  const length = Math.max(result.atRate.length, result.predictive.length);
  return [
    {
      name: 'probability of each number of detections',
      columns: ['detections', 'probability_at_rate', 'probability_predictive', 'is_counted'],
      rows: Array.from({ length }, (_, k) => [
        k,
        result.atRate[k] ?? 0,
        result.predictive[k] ?? 0,
        k === result.counted,
      ]),
    },
  ];
}
