import { PosteriorChart } from '@/components/charts/posterior-chart';
import { rateAxisMax } from '@/components/charts/rate-curve';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { countOf } from '@/components/runs/level-table';
import { savedAnswer } from '@/components/runs/live-answer';
import { reachTo } from '@/components/runs/posterior-data';
import { RecordedStatementCopy } from '@/components/statement/statement-copy';
import { Plate, StatementNumber } from '@/components/ui/plate';
import { describeLevel } from '@/lib/inference';
import { formatSignificant, THIN_SPACE } from '@/lib/quantities/display';
import type { ComparedInput, ComparedRun } from './compare-differences';

/** Both statements, and both posteriors and limits on one axis. */
export function ComparePlate({
  collaboration,
  a,
  b,
  inputs,
}: {
  collaboration: string;
  a: ComparedRun;
  b: ComparedRun;
  inputs: ComparedInput[];
}) {
  const first = savedAnswer(a.result.answer);
  const second = savedAnswer(b.result.answer);
  const top = rateAxisMax([first.limit, second.limit], Number.POSITIVE_INFINITY);
  const largest = Math.min(top, a.result.quantity === 'host_fraction' ? 1 : top);
  const same = inputs.filter((row) => row.a === row.b && row.name !== 'Maps');
  return (
    <Plate className="grid gap-x-[26px] gap-y-6 xl:grid-cols-[450px_1fr]">
      <div>
        <Side letter="A" side={a} collaboration={collaboration} limit={first.limit} />
        <hr className="my-4 border-rule border-t" />
        <Side letter="B" side={b} collaboration={collaboration} limit={second.limit} isSecond />
        <p className="mt-4 max-w-[52ch] text-ink3 text-note">{bothWords(same)}</p>
      </div>
      <PosteriorChart
        name="A"
        label={detectionWords(a)}
        curve={reachTo(first.curve, largest)}
        limit={first.limit}
        credibleLevel={a.result.credibleLevel}
        quantity={a.result.quantity}
        second={{
          name: 'B',
          label: detectionWords(b),
          curve: reachTo(second.curve, largest),
          limit: second.limit,
        }}
      />
    </Plate>
  );
}

function Side({
  collaboration,
  letter,
  side,
  limit,
  isSecond = false,
}: {
  collaboration: string;
  letter: string;
  side: ComparedRun;
  limit: number;
  isSecond?: boolean;
}) {
  const isFraction = side.result.quantity === 'host_fraction';
  return (
    <div>
      <p className="flex items-center gap-[9px] text-ink3 text-note">
        <b
          className={`grid size-[22px] place-items-center rounded-[2px] ${isSecond ? 'border-[1.5px] border-bound text-bound' : 'bg-bound text-page'}`}
        >
          {letter}
        </b>
        {side.key}, run {side.run.number}
        {side.run.createdBy && `, ${side.run.createdBy}`}
      </p>
      <div className={isSecond ? '[&_.statement-number]:font-light' : undefined}>
        <StatementNumber
          value={formatSignificant(100 * limit, 2)}
          unit={isFraction ? `${THIN_SPACE}%` : undefined}
          fontSizePx={78}
        />
      </div>
      <p className="text-ink2">
        {isFraction ? '' : 'planets per 100 stars; '}
        {detectionWords(side)}, <MassRange definition={side.definition} />,{' '}
        <AxisRange definition={side.definition} />, {describeLevel(side.result.credibleLevel)}
      </p>
      <div className="-ml-1">
        <RecordedStatementCopy
          collaboration={collaboration}
          runId={side.run.id}
          of={`limit ${letter}`}
        />
      </div>
    </div>
  );
}

export function detectionWords(side: ComparedRun): string {
  return side.recipe.detections === 'none'
    ? 'zero detections'
    : countOf(side.result.counted.length);
}

function bothWords(same: ComparedInput[]): string {
  const words = same
    .filter(({ name }) => ['Level', 'Likelihood', 'Prior', 'Stars', 'Cooling'].includes(name))
    .map(({ name, a }) =>
      name === 'Stars' ? `${a} stars` : name === 'Level' ? `${a} credible` : a,
    );
  return words.length === 0
    ? 'The two share neither level, prior nor sample.'
    : `Both: ${words.join('; ')}.`;
}
