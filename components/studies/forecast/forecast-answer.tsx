'use client';

import { LimitByStarsChart } from '@/components/charts/limit-by-stars-chart';
import { YieldChart } from '@/components/charts/yield-chart';
import { FactsStrip } from '@/components/ui/facts-strip';
import { SectionOpener } from '@/components/ui/section-opener';
import { describeLevel } from '@/lib/inference';
import {
  formatLimit,
  formatPercent,
  formatPlain,
  formatSignificant,
} from '@/lib/quantities/display';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';
import { forecastRateInWords, neededInWords } from './forecast-words';
import { GainTable } from './gain-table';

/** What a planned survey would find, what it would say if it finds nothing, and where to begin. */
export function ForecastAnswer({ asked, settings, result }: AnswerProps<'forecast'>) {
  const { quantity } = asked;
  const levelLabel = describeLevel(asked.credibleLevel);
  const [few, many] = result.yield.interval68;
  const limitNow = asked.result.answer.limit;
  return (
    <>
      <FactsStrip
        facts={[
          {
            name: 'detections expected',
            help: 'forecast',
            value: formatSignificant(result.yield.mean, 2),
            note: few === many ? `most likely ${few}` : `68\u2009%: ${few} to ${many}`,
          },
          { name: 'chance of none', value: formatPercent(result.chanceOfNone) },
          {
            name: 'limit if none, planned stars alone',
            value: formatLimit(result.limitIfNone, quantity),
            note: `(${levelLabel})`,
            isBound: true,
          },
          {
            name: 'limit if none, with the run',
            value: formatLimit(result.limitIfNoneTogether, quantity),
            note: `now ${formatLimit(limitNow, quantity)}`,
            isBound: true,
          },
          {
            name: 'stars’ worth of sensitivity',
            help: 'exposure',
            value: formatPlain(result.exposure, 3),
            note: `of ${result.stars} stars`,
          },
        ]}
      />
      <div className="mt-7 grid gap-x-12 gap-y-8 xl:grid-cols-2">
        <section className="min-w-0">
          <SectionOpener title="How many would be found" help="detection-counts" level={3} />
          <YieldChart
            distribution={result.distribution}
            mean={result.yield.mean}
            interval68={result.yield.interval68}
            rateLabel={forecastRateInWords(settings.assumedRate, quantity)}
          />
        </section>
        <section className="min-w-0">
          <SectionOpener title="How many stars it takes" help="stars-needed" level={3} />
          <LimitByStarsChart
            {...result.against}
            wanted={result.wantedLimit}
            starsNeeded={result.starsNeeded}
            quantity={quantity}
            levelLabel={levelLabel}
            rateLabel={forecastRateInWords(settings.assumedRate, quantity)}
          />
          <p className="mt-1 max-w-[72ch]">{neededInWords(result, quantity)}</p>
        </section>
      </div>
      <section className="mt-8 min-w-0">
        <SectionOpener
          help="gain"
          title={result.gain.length > 20 ? 'Which 20 stars next' : 'Which stars next'}
          level={3}
          context="each added alone to what the run knows, nothing found"
        />
        <GainTable
          gain={result.gain}
          limitNow={limitNow}
          quantity={quantity}
          levelLabel={levelLabel}
        />
      </section>
      <AnswerNotes notes={result.notes} />
    </>
  );
}
