'use client';

import { useMemo } from 'react';
import { LimitFieldChart } from '@/components/charts/limit-field-chart';
import { LimitSweepChart } from '@/components/charts/limit-sweep-chart';
import { describeLevel, quotedSweepValue } from '@/lib/inference';
import { fromLogIndex } from '@/lib/population';
import { formatLimit } from '@/lib/quantities/display';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';
import { companionPlaces, ownValue, sweepAxis } from './sweep-parameters';

/** The limit along one choice, or over the plane of both indices. */
export function SweepAnswer(props: AnswerProps<'sweep'>) {
  const { asked, result } = props;
  const { quantity } = asked;
  const levelLabel = describeLevel(asked.credibleLevel);
  const axis = useMemo(() => sweepAxis(result.over, result.value), [result]);
  if (result.plane) return <IndexPlaneAnswer {...props} plane={result.plane} />;
  const own = ownValue(result.over, asked);
  return (
    <>
      <LimitSweepChart
        x={axis}
        limit={result.limit}
        limitZero={result.limitZero}
        detections={result.detections}
        exposure={result.exposure}
        isSetByPrior={result.isSetByPrior}
        entries={companionPlaces(result.over, asked)}
        here={
          own === undefined
            ? undefined
            : { x: quotedSweepValue(result.over, own), limit: asked.result.answer.limit }
        }
        quantity={quantity}
        levelLabel={levelLabel}
      />
      <AnswerNotes notes={result.notes} />
    </>
  );
}

type Plane = NonNullable<AnswerProps<'sweep'>['result']['plane']>;

function IndexPlaneAnswer({ asked, result, plane }: AnswerProps<'sweep'> & { plane: Plane }) {
  const axes = useMemo(
    () => ({
      x: sweepAxis('semi-major-axis-index', plane.semiMajorAxisIndex),
      y: sweepAxis('mass-index', plane.massIndex),
    }),
    [plane],
  );
  const here = useMemo(() => {
    if (asked.definition?.form !== 'power-law') return undefined;
    const { massIndex, semiMajorAxisIndex } = asked.definition;
    const [x, y] = [fromLogIndex(semiMajorAxisIndex, 'linear'), fromLogIndex(massIndex, 'linear')];
    const isInside = (at: number[], value: number) => value >= at[0] && value <= at[at.length - 1];
    if (!isInside(axes.x.at, x) || !isInside(axes.y.at, y)) return undefined;
    return { x, y, name: `this run: ${formatLimit(asked.result.answer.limit, asked.quantity)}` };
  }, [asked, axes]);
  return (
    <>
      <LimitFieldChart
        {...axes}
        limit={plane.limit}
        quantity={asked.quantity}
        levelLabel={describeLevel(asked.credibleLevel)}
        subject="Upper limit over both indices"
        here={here}
      />
      <AnswerNotes notes={result.notes} />
    </>
  );
}
