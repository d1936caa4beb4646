import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

export function influenceTables({ asked, result }: AnswerProps<'influence'>): DataTable[] {
  const groups = (rows: typeof result.groups) =>
    rows.map(({ name, stars, without }) => [
      name,
      stars,
      without.limit,
      without.ratio,
      without.exposure,
    ]);
  const columns = ['name', 'stars', 'limit_without', 'ratio', 'exposure_without_stars'];
  return [
    {
      name: `limit without each star, ${asked.quantity}`,
      columns: [
        'star',
        'detection_probability',
        'hosts',
        'limit_without',
        'ratio',
        'exposure_without_stars',
      ],
      rows: result.stars.map(({ name, probability, hosts, without }) => [
        name,
        probability,
        hosts.join('; '),
        without.limit,
        without.ratio,
        without.exposure,
      ]),
    },
    { name: 'limit without each survey', columns, rows: groups(result.surveys) },
    { name: 'limit without each group', columns, rows: groups(result.groups) },
  ];
}
