'use client';

import { CoverageChart } from '@/components/charts/coverage-chart';
import { RankHistogramChart } from '@/components/charts/rank-histogram-chart';
import { FactsStrip } from '@/components/ui/facts-strip';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { describeLevel } from '@/lib/inference';
import { formatSignificant } from '@/lib/quantities/display';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';
import { biasInWords } from './calibration-words';
import { TruthTable } from './truth-table';

/** Below this chance a test speaks against the posteriors. */
const LEAST_P = 0.001;

/** Whether limits hold as often as they say, and by which tests that was judged. */
export function CalibrationAnswer({ asked, result }: AnswerProps<'calibration'>) {
  const { ranks } = result;
  const isFraction = asked.quantity === 'host_fraction';
  const level = describeLevel(asked.credibleLevel);
  const rateName = isFraction ? 'true host fraction' : 'true rate, planets per 100 stars';
  const unit = isFraction ? '\u2009%' : '';
  const known = result.atTruth.flatMap(({ exact, rate, ...row }) =>
    exact === null ? [] : [{ ...row, x: rate, expected: exact }],
  );
  return (
    <>
      <p className="mb-3.5">
        <StateMark kind={result.passes ? 'ok' : 'bad'}>
          {result.passes ? 'Calibrated' : 'Not calibrated: the limit should not be quoted as it is'}
        </StateMark>
      </p>
      <FactsStrip
        facts={[
          { name: 'surveys invented', value: result.surveys },
          {
            name: 'chance of ranks this uneven',
            help: 'calibration',
            value: chance(ranks.pValue),
            note: `at least ${LEAST_P}`,
          },
          {
            name: 'chance of probabilities this uneven',
            value: chance(ranks.kolmogorovP),
            note: `at least ${LEAST_P}`,
          },
          {
            name: 'ranks’ largest distance from even',
            value: formatSignificant(ranks.ecdfDistance, 2),
            note: `99.9\u2009% band ${formatSignificant(ranks.ecdfBand, 2)}`,
          },
          {
            name: 'median less truth, mean',
            value: biasInWords(result.medianBias, asked.quantity),
          },
        ]}
      />
      <div className="mt-7 grid gap-x-12 gap-y-8 xl:grid-cols-2">
        <section className="min-w-0">
          <SectionOpener
            title="How often limits hold"
            help="coverage"
            level={3}
            context="truth drawn from the prior"
          />
          <CoverageChart
            points={result.coverage.map((row) => ({ ...row, x: row.level }))}
            xName="credible level"
            xUnit={'\u2009%'}
            subject={`Coverage of upper limits in ${result.surveys} invented surveys`}
          />
        </section>
        <section className="min-w-0">
          <SectionOpener
            title="Where truths lie"
            level={3}
            context={`rank among ${ranks.draws} draws from the posterior`}
          />
          <RankHistogramChart bins={ranks.bins} draws={ranks.draws} />
        </section>
        {result.atTruth.length > 0 && (
          <section className="min-w-0">
            <SectionOpener
              title={`The ${level} limit at fixed truths`}
              level={3}
              context="need not be the level: only their average over the prior is"
            />
            {known.length === result.atTruth.length ? (
              <CoverageChart
                points={known}
                xName={rateName}
                xUnit={unit}
                subject={`Coverage of the ${level} limit at fixed truths`}
              />
            ) : (
              <TruthTable rows={result.atTruth} rateName={rateName} unit={unit} />
            )}
          </section>
        )}
        {result.otherTruth && (
          <section className="min-w-0">
            <SectionOpener
              title="If the truth is another population"
              level={3}
              context={result.otherTruth.population}
            />
            <p className="mb-3 max-w-[72ch]">{result.otherTruth.verdict}.</p>
            <CoverageChart
              points={result.otherTruth.coverage.map((row) => ({ ...row, x: row.level }))}
              xName="credible level"
              xUnit={'\u2009%'}
              subject={`Coverage of upper limits where the truth follows ${result.otherTruth.population}`}
            />
          </section>
        )}
      </div>
      <AnswerNotes notes={result.notes} />
    </>
  );
}

function chance(probability: number): string {
  return probability < 1e-4 ? 'under 0.0001' : formatSignificant(probability, 2);
}
