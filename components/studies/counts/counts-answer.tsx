'use client';

import { CountsChart } from '@/components/charts/counts-chart';
import { FactsStrip } from '@/components/ui/facts-strip';
import { formatPercent, formatRate } from '@/lib/quantities/display';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';
import { rateInWords } from './counts-words';

/** What the rate predicts, against what was counted. */
export function CountsAnswer({ asked, result }: AnswerProps<'counts'>) {
  const none = result.predictive[0] ?? 0;
  return (
    <>
      <FactsStrip
        facts={[
          { name: 'counted', help: 'detection-counts', value: result.counted },
          {
            name: asked.quantity === 'host_fraction' ? 'host fraction' : 'rate',
            value: formatRate(result.rate, asked.quantity),
          },
          result.counted === 0
            ? { name: 'chance of none at that rate', value: formatPercent(result.atRate[0] ?? 0) }
            : {
                name: `chance of ${result.counted} or more at that rate`,
                value: formatPercent(result.atLeastCounted),
              },
          { name: 'chance of none in a repeat', value: formatPercent(none) },
        ]}
      />
      <CountsChart
        atRate={result.atRate}
        predictive={result.predictive}
        counted={result.counted}
        rateLabel={rateInWords(result.rate, asked.quantity)}
      />
      <AnswerNotes notes={result.notes} />
    </>
  );
}
