import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

export function overlapTables({ asked, result }: AnswerProps<'overlap-rules'>): DataTable[] {
  const { lowest, highest } = result.bracket;
  return [
    {
      name: `limit under each rule, ${asked.quantity}`,
      columns: ['rule', 'limit', 'exposure_stars', 'is_used', 'fault'],
      rows: [
        ...result.rules.map(({ rule, limit, exposure, fault }) => [
          rule,
          limit,
          exposure,
          rule === result.ruleUsed,
          fault,
        ]),
        ['bracket-lowest', lowest, null, false, null],
        ['bracket-highest', highest, null, false, null],
      ],
    },
    {
      name: 'shared stars, detection probability under each rule',
      columns: ['star', 'surveys', 'same_position', 'deepest', 'independent'],
      rows: result.shared.map(({ name, surveys, probability }) => [
        name,
        surveys.join('; '),
        probability.samePosition,
        probability.deepest,
        probability.independent,
      ]),
    },
  ];
}
