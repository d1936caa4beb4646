'use client';

import { PosteriorChart } from '@/components/charts/posterior-chart';
import type { RateCurve } from '@/components/charts/rate-curve';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { Conditions, conditionRow, Plate, StatementNumber } from '@/components/ui/plate';
import { countsAnything, describeLevel, describePrior } from '@/lib/inference';
import { formatSignificant, THIN_SPACE } from '@/lib/quantities/display';
import type { ShownRun } from '@/lib/schemas/release-page';
import type { RateAnswer } from '@/lib/schemas/runs';

export const curveOf = ({ curve }: RateAnswer): RateCurve => ({
  rate: Float64Array.from(curve.value),
  density: Float64Array.from(curve.density),
  cumulative: Float64Array.from(curve.cumulative),
});

/** Conditions that stand with the statement; all others below it. */
const MAIN = ['Prior', 'Population', 'Detections', 'Exposure', 'Cooling'];

/** The limit as a sentence, its posterior, and every condition as the run stated it. */
export function ReleasePlate({ run }: { run: ShownRun }) {
  const { answer, zero, quantity, credibleLevel, counted, candidates, statement } = run.result;
  const conditions = statement.conditions.map(conditionRow);
  const isMain = ({ name }: { name: string }) => MAIN.includes(name);
  const isFraction = quantity === 'host_fraction';
  return (
    <Plate>
      <div className="grid gap-x-10 gap-y-6 lg:grid-cols-[minmax(0,2fr)_minmax(0,3fr)] print:grid-cols-[minmax(0,2fr)_minmax(0,3fr)] print:gap-x-5">
        <div className="min-w-0">
          <p className="text-ink3 text-note">
            {answer.isConstrained
              ? `${describeLevel(credibleLevel)} credible upper limit`
              : 'No limit'}
          </p>
          {answer.isConstrained && (
            <StatementNumber
              value={formatSignificant(100 * answer.limit, 2)}
              unit={isFraction ? `${THIN_SPACE}%` : undefined}
            />
          )}
          <p className="statement">
            {isFraction ? 'of stars host at least one planet of ' : 'planets of '}
            <b>
              <MassRange definition={run.population} />
            </b>{' '}
            at{' '}
            <b>
              <AxisRange definition={run.population} />
            </b>
            {!isFraction && ' per 100 stars'}
          </p>
          <div className="mt-5">
            <Conditions rows={conditions.filter(isMain)} />
          </div>
        </div>
        <div className="min-w-0">
          <PosteriorChart
            curve={curveOf(answer)}
            limit={answer.limit}
            credibleLevel={credibleLevel}
            quantity={quantity}
            median={answer.median}
            interval68={countsAnything(counted, candidates) ? answer.interval68 : undefined}
            prior={
              answer.curve.prior.length > 0
                ? {
                    density: Float64Array.from(answer.curve.prior),
                    label: describePrior(run.prior, quantity),
                  }
                : undefined
            }
            alternative={
              counted.length > 0
                ? { label: 'zero detections', curve: curveOf(zero), limit: zero.limit }
                : undefined
            }
            height={320}
          />
        </div>
      </div>
      <div className="mt-4 border-rule border-t pt-3.5">
        <Conditions rows={conditions.filter((row) => !isMain(row))} isInPairs />
      </div>
    </Plate>
  );
}
