'use client';

import { useMemo, useState } from 'react';
import { CornerChart } from '@/components/charts/corner-chart';
import { limitWithLevel } from '@/components/charts/posterior-words';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { FactsStrip } from '@/components/ui/facts-strip';
import { Limit } from '@/components/ui/notation';
import type { IndexConvention } from '@/lib/population';
import { describeIndexConvention, formatLimit, formatSignificant } from '@/lib/quantities/display';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';
import { cornerParameters, cornerPlanes } from './free-index-parameters';
import { freeAgainstFixed } from './free-indices-words';
import { ParameterTable } from './parameter-table';

/** The rate and both indices together, and what letting them go does to the limit. */
export function FreeIndicesAnswer({ asked, result }: AnswerProps<'free-indices'>) {
  const [convention, setConvention] = useState<IndexConvention>('linear');
  const { quantity, credibleLevel } = asked;
  const parameters = useMemo(
    () => cornerParameters({ asked, result }, convention),
    [asked, result, convention],
  );
  const planes = useMemo(() => cornerPlanes({ result }, convention), [result, convention]);
  const { correlations } = result;
  return (
    <>
      <p className="mb-4 max-w-[72ch]">
        With free indices <Limit>{limitWithLevel(result.limit, credibleLevel, quantity)}</Limit>,
        with the indices of the run <Limit>{formatLimit(result.limitFixed, quantity)}</Limit>.{' '}
        {freeAgainstFixed(result.limit, result.limitFixed)}
      </p>
      <div className="grid gap-x-12 gap-y-6 xl:grid-cols-[minmax(0,820fr)_minmax(0,470fr)]">
        <CornerChart
          parameters={parameters}
          planes={planes}
          limit={{
            free: 100 * result.limit,
            fixed: 100 * result.limitFixed,
            words: limitWithLevel(result.limit, credibleLevel, quantity),
          }}
        />
        <div className="min-w-0">
          <div className="mb-3 flex flex-wrap items-end justify-between gap-3">
            <p className="text-ink2 text-note">
              Indices of {describeIndexConvention('mass', convention).replace(/ ∝.*/, '')} and{' '}
              {describeIndexConvention('semi-major axis', convention).replace(/ ∝.*/, '')}
            </p>
            <ConsequenceSwitch<IndexConvention>
              label="Convention of the indices"
              isLabelHidden
              size="small"
              value={convention}
              onChange={setConvention}
              options={[
                { value: 'linear', label: 'linear' },
                { value: 'log', label: 'per logarithm' },
              ]}
            />
          </div>
          <ParameterTable result={result} parameters={parameters} convention={convention} />
          <p className="mt-2 text-chart text-ink3">
            Planes: areas of 68 and 95{'\u2009'}%. Curves: all of the density, its central 68
            {'\u2009'}% darker, the median dotted. Dashed: held fixed in the run. Intervals: equal
            probability on each side.
          </p>
          <div className="mt-6">
            <FactsStrip
              facts={[
                { name: 'α with the rate', value: correlation(correlations.rateMassIndex) },
                {
                  name: 'β with the rate',
                  value: correlation(correlations.rateSemiMajorAxisIndex),
                },
                { name: 'α with β', value: correlation(correlations.indices) },
              ]}
            />
            <p className="text-chart text-ink3">
              Correlations. {result.nodes} nodes; doubling them last moved the limit by{' '}
              {movedInWords(result.movedBy)} of itself.
              {result.logEvidence !== null &&
                ` Logarithm of the evidence ${formatSignificant(result.logEvidence, 4)}.`}
            </p>
          </div>
          <AnswerNotes notes={result.notes} />
        </div>
      </div>
    </>
  );
}

function movedInWords(share: number): string {
  return share < 1e-5 ? 'less than 0.001\u2009%' : `${formatSignificant(100 * share, 1)}\u2009%`;
}

function correlation(value: number): string {
  return `${value < 0 ? '\u2212' : ''}${Math.abs(value).toFixed(2)}`;
}
