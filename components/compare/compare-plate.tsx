import { OverlaidPosteriorsChart } from '@/components/charts/overlaid-posteriors-chart';
import { rateAxisMax } from '@/components/charts/rate-curve';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { countOf } from '@/components/runs/level-table';
import { savedAnswer } from '@/components/runs/limit-answer';
import { reachTo } from '@/components/runs/posterior-data';
import { RecordedStatementCopy } from '@/components/statement/statement-copy';
import { Icon } from '@/components/ui/icon';
import { Link } from '@/components/ui/link';
import { Plate, StatementNumber } from '@/components/ui/plate';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatSignificant, THIN_SPACE } from '@/lib/quantities/display';
import { compareAddress } from './address';
import { type ComparedInput, type ComparedRun, isSameInAll } from './differences';

interface ComparePlateProps {
  collaboration: string;
  sides: ComparedRun[];
  inputs: ComparedInput[];
}

/** Every statement, and the posteriors and limits that share a quantity on one axis. */
export function ComparePlate({ collaboration, sides, inputs }: ComparePlateProps) {
  const drawn = sides.filter(({ result }) => result.quantity === sides[0].result.quantity);
  const answers = drawn.map(({ result }) => savedAnswer(result.answer));
  const top = rateAxisMax(
    answers.map(({ limit }) => limit),
    sides[0].result.quantity === 'host_fraction' ? 1 : Number.POSITIVE_INFINITY,
  );
  const left = sides.filter((side) => !drawn.includes(side)).map(({ letter }) => letter);
  const isMany = sides.length > 2;
  return (
    <Plate className="grid gap-x-[26px] gap-y-6 xl:grid-cols-[450px_1fr]">
      <div>
        <ul className="grid gap-4 [&>li+li]:border-rule [&>li+li]:border-t [&>li+li]:pt-4">
          {sides.map((side, index) => (
            <li key={side.letter}>
              <Side
                {...{ side, sides, collaboration }}
                isFirst={index === 0}
                fontSizePx={isMany ? 40 : 78}
              />
            </li>
          ))}
        </ul>
        <p className="mt-4 max-w-[52ch] text-ink3 text-note">{allWords(inputs)}</p>
      </div>
      <div className="min-w-0">
        <OverlaidPosteriorsChart
          posteriors={drawn.map((side, index) => ({
            letter: side.letter,
            label: `${side.name}, ${detectionWords(side)}`,
            curve: reachTo(answers[index].curve, top),
            limit: answers[index].limit,
            credibleLevel: side.result.credibleLevel,
          }))}
          quantity={sides[0].result.quantity}
        />
        {left.length > 0 && (
          <p className="mt-2 flex items-center gap-1.5 font-semibold text-ink text-note">
            <Icon name="warn" size={14} />
            <span>
              {left.join(', ')} {left.length === 1 ? 'answers' : 'answer'} for another quantity and{' '}
              {left.length === 1 ? 'has' : 'have'} no place on this axis.
            </span>
          </p>
        )}
      </div>
    </Plate>
  );
}

function Side({
  side,
  sides,
  collaboration,
  isFirst,
  fontSizePx,
}: {
  side: ComparedRun;
  sides: ComparedRun[];
  collaboration: string;
  isFirst: boolean;
  fontSizePx: number;
}) {
  const { answer, quantity, credibleLevel } = side.result;
  const isFraction = quantity === 'host_fraction';
  return (
    <div>
      <p className="flex items-center gap-[9px] text-ink3 text-note">
        <b
          className={`grid size-[22px] flex-none place-items-center rounded-[2px] ${isFirst ? 'bg-bound text-page' : 'border-[1.5px] border-bound text-bound'}`}
        >
          {side.letter}
        </b>
        <span className="min-w-0">
          <Link href={`/${collaboration}/analyses/${side.address.key}`} className="underline">
            {side.address.key}
          </Link>
          , run {side.run.number}
          {side.run.createdBy && `, ${side.run.createdBy}`}
        </span>
      </p>
      <div className={isFirst ? undefined : '[&_.statement-number]:font-light'}>
        {answer.isConstrained ? (
          <StatementNumber
            value={formatSignificant(100 * answer.limit, 2)}
            unit={isFraction ? `${THIN_SPACE}%` : undefined}
            fontSizePx={fontSizePx}
          />
        ) : (
          <p className="statement">no limit</p>
        )}
      </div>
      <p className="text-ink2">
        {isFraction ? '' : 'planets per 100 stars; '}
        {detectionWords(side)}, <MassRange definition={side.definition} />,{' '}
        <AxisRange definition={side.definition} />, {describeLevel(credibleLevel)}
      </p>
      <div className="-ml-1 flex flex-wrap items-center gap-x-4">
        {!side.address.isZero && (
          <RecordedStatementCopy
            collaboration={collaboration}
            runId={side.run.id}
            of={`limit ${side.letter}`}
          />
        )}
        <ZeroTwin {...{ side, sides, collaboration }} />
      </div>
    </div>
  );
}

/** The same run with its detections set aside, one click away. */
function ZeroTwin({
  side,
  sides,
  collaboration,
}: {
  side: ComparedRun;
  sides: ComparedRun[];
  collaboration: string;
}) {
  const { address, result } = side;
  if (address.isZero || result.counted.length === 0 || sides.length >= 6) return null;
  const twin = { ...address, isZero: true };
  const hasTwin = sides.some(
    ({ address: one }) => one.isZero && one.key === twin.key && one.run === twin.run,
  );
  if (hasTwin) return null;
  return (
    <Link
      className="px-1 font-semibold text-note"
      href={compareAddress(collaboration, [...sides.map(({ address: one }) => one), twin])}
    >
      Beside zero detections: {formatLimit(result.zero.limit, result.quantity)}
    </Link>
  );
}

export function detectionWords(side: ComparedRun): string {
  return side.recipe.detections === 'none'
    ? 'zero detections'
    : countOf(side.result.counted.length);
}

const told = ['Level', 'Likelihood', 'Prior', 'Stars', 'Cooling'];

function allWords(inputs: ComparedInput[]): string {
  const words = inputs
    .filter((row) => isSameInAll(row) && told.includes(row.name))
    .map(({ name, values: [value] }) =>
      name === 'Stars' ? `${value} stars` : name === 'Level' ? `${value} credible` : value,
    );
  return words.length === 0
    ? 'They share neither level, prior nor sample.'
    : `All: ${words.join('; ')}.`;
}
