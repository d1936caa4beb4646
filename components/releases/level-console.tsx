'use client';

import { useMemo, useState } from 'react';
import { valueAt } from '@/components/charts/paths';
import { TraceSlider } from '@/components/charts/trace-slider';
import { Button } from '@/components/ui/button';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import type { ShownRun } from '@/lib/schemas/release-page';
import type { RateAnswer } from '@/lib/schemas/runs';

const [LOWEST, HIGHEST] = [50, 99.5];
const STEP = 0.5;

/** The upper limit at each level, read off the frozen posterior. */
function traceOf({ curve }: RateAnswer) {
  const count = Math.round((HIGHEST - LOWEST) / STEP) + 1;
  const parameter = Float64Array.from({ length: count }, (_, i) => LOWEST + STEP * i);
  const cumulative = Float64Array.from(curve.cumulative);
  const value = Float64Array.from(curve.value);
  const limit = parameter.map((level) => valueAt(cumulative, value, level / 100));
  return { parameter, limit };
}

/** Other levels and no detections on the frozen posteriors: a look, and no part of the release. */
export function LevelConsole({ run }: { run: ShownRun }) {
  const { answer, zero, quantity, credibleLevel, counted } = run.result;
  const released = Math.round(1000 * credibleLevel) / 10;
  const [level, setLevel] = useState(released);
  const [isZero, setZero] = useState(false);
  const trace = useMemo(() => traceOf(isZero ? zero : answer), [answer, zero, isZero]);
  const isReleased = level === released && !isZero;
  const limit = isReleased ? answer.limit : valueAt(trace.parameter, trace.limit, level);
  if (!answer.isConstrained) return null;
  return (
    <section
      className="mt-6 rounded bg-well px-5 py-4 print:hidden"
      aria-label="Try other assumptions"
    >
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-4">
        <h3 className="font-semibold">Try other assumptions</h3>
        <p className="text-chart text-ink3">not part of the release</p>
      </div>
      <div className="grid items-center gap-x-8 gap-y-4 md:grid-cols-[minmax(0,260px)_1fr]">
        <TraceSlider
          name="Credible level"
          trace={trace}
          value={level}
          savedValue={released}
          min={LOWEST}
          max={HIGHEST}
          step={STEP}
          onChange={setLevel}
          formatLimit={(value) => formatLimit(value, quantity).replace('<', '')}
          formatValue={(value) => `${formatPlain(value)}${THIN_SPACE}%`}
          ticks={[50, 68, 80, 95]}
        />
        <div>
          <p>
            <b className="limit text-[20px]">{formatLimit(limit, quantity)}</b> at{' '}
            {formatPlain(level)}
            {THIN_SPACE}%{isZero && ', zero detections'}
          </p>
          <p className="mt-1 max-w-[52ch] text-ink2 text-note">
            {isReleased
              ? `As released. Move the level${counted.length > 0 ? ', or set the detections aside' : ''}.`
              : `In place of the released ${formatLimit(answer.limit, quantity)} at ${describeLevel(credibleLevel)}. The frozen posterior is used as it is.`}
          </p>
          <div className="mt-3 flex flex-wrap gap-2">
            {counted.length > 0 && (
              <Button size="small" onClick={() => setZero(!isZero)} aria-pressed={isZero}>
                Zero detections
              </Button>
            )}
            {!isReleased && (
              <Button
                size="small"
                icon="undo"
                onClick={() => {
                  setLevel(released);
                  setZero(false);
                }}
              >
                Put back
              </Button>
            )}
          </div>
        </div>
      </div>
      {run.alternatives.length > 0 && (
        <div className="mt-4 border-rule border-t pt-3">
          <h4 className="font-semibold text-note">Asked of the same run, with its frozen maps</h4>
          <p className="mb-1 max-w-[72ch] text-chart text-ink3">
            Limits at {describeLevel(credibleLevel)}, as released; they do not follow the controls
            above.
          </p>
          <dl className="grid gap-x-4 gap-y-1 text-note md:grid-cols-[minmax(0,220px)_1fr]">
            {run.alternatives.map(({ kind, name, headline }) => (
              <div key={kind} className="contents">
                <dt className="text-ink3 first-letter:uppercase">{name}</dt>
                <dd className="text-ink2">{headline}</dd>
              </div>
            ))}
          </dl>
        </div>
      )}
    </section>
  );
}
