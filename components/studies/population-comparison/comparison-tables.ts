import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

export function comparisonTables({
  asked,
  result,
}: AnswerProps<'population-comparison'>): DataTable[] {
  return [
    {
      name: `evidence of each population, limits as ${asked.quantity}`,
      columns: [
        'population',
        'version',
        'name',
        'is_own',
        'ln_bayes_factor',
        'ln_evidence',
        'limit',
        'exposure_stars',
        'detections',
        'fault',
      ],
      rows: result.rows.map((row) => [
        row.key,
        row.version,
        row.name,
        row.isOwn,
        row.logBayesFactor,
        row.logEvidence,
        row.limit,
        row.exposure,
        row.detections,
        row.fault,
      ]),
    },
  ];
}
