import type { DataTable } from '@/components/charts/data-table';
import type { AnswerProps } from '../kind-entry';

export function calibrationTables({ asked, result }: AnswerProps<'calibration'>): DataTable[] {
  const { ranks } = result;
  const coverage = (rows: typeof result.coverage) =>
    rows.map(({ level, observed, expected, standardError }) => [
      level,
      observed,
      expected,
      standardError,
    ]);
  const columns = ['credible_level', 'observed', 'expected', 'standard_error'];
  return [
    { name: 'coverage, truth drawn from the prior', columns, rows: coverage(result.coverage) },
    {
      name: 'ranks of the truths in their posteriors',
      columns: ['bin_from', 'bin_to', 'surveys'],
      rows: ranks.bins.map((count, bin) => [
        bin / ranks.bins.length,
        (bin + 1) / ranks.bins.length,
        count,
      ]),
    },
    {
      name: 'tests',
      columns: ['test', 'value'],
      rows: [
        ['chi_square', ranks.chiSquare],
        ['chi_square_p', ranks.pValue],
        ['ecdf_distance', ranks.ecdfDistance],
        ['ecdf_band_99.9_percent', ranks.ecdfBand],
        ['kolmogorov_smirnov_p', ranks.kolmogorovP],
        ['median_minus_truth_mean', result.medianBias.mean],
        ['median_minus_truth_standard_error', result.medianBias.standardError],
        ['passes', result.passes],
      ],
    },
    {
      name: `coverage of the limit at the run's level at fixed truths, ${asked.quantity}`,
      columns: ['true_rate', 'observed', 'exact', 'standard_error'],
      rows: result.atTruth.map(({ rate, observed, exact, standardError }) => [
        rate,
        observed,
        exact,
        standardError,
      ]),
    },
    ...(result.otherTruth
      ? [
          {
            name: `coverage, truth of population ${result.otherTruth.population}`,
            columns,
            rows: coverage(result.otherTruth.coverage),
          },
        ]
      : []),
  ];
}
