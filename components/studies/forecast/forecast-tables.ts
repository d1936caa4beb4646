import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

export function forecastTables({ asked, result }: AnswerProps<'forecast'>): DataTable[] {
  const { against, gain } = result;
  return [
    {
      name: `forecast, ${asked.quantity}`,
      columns: ['quantity', 'value'],
      rows: [
        ['stars', result.stars],
        ['exposure_stars', result.exposure],
        ['detections_mean', result.yield.mean],
        ['chance_of_none', result.chanceOfNone],
        ['limit_if_none_alone', result.limitIfNone],
        ['limit_if_none_together', result.limitIfNoneTogether],
        ['wanted_limit', result.wantedLimit],
        ['stars_needed', result.starsNeeded],
      ],
    },
    {
      name: 'forecast: probability of each number of detections',
      columns: ['detections', 'probability'],
      rows: result.distribution.map((chance, n) => [n, chance]),
    },
    {
      name: 'forecast: limit of the planned stars alone',
      columns: ['stars', 'limit_if_none', 'limit_low_68', 'limit_high_68'],
      rows: against.stars.map((stars, i) => [
        stars,
        against.limitIfNone[i],
        against.low[i],
        against.high[i],
      ]),
    },
    {
      name: 'forecast: stars by gain',
      columns: ['rank', 'star', 'detection_probability', 'limit_with_it_alone'],
      rows: gain.map((star, i) => [i + 1, star.name, star.probability, star.limitWithItAlone]),
    },
  ];
}
