'use client';

import { useMemo, useState } from 'react';
import { JupiterMassText } from '@/components/charts/axes';
import { type FieldAxis, LimitFieldChart } from '@/components/charts/limit-field-chart';
import { asMark } from '@/components/runs/sensitivity-section';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { describeLevel } from '@/lib/inference';
import { formatPlain, formatSignificant } from '@/lib/quantities/display';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';

type View = 'node' | 'tail';

const auAxis = (at: number[]): FieldAxis => ({
  at,
  isLog: true,
  name: 'semi-major axis, AU',
  plainName: 'semi-major axis',
  say: (value) => `${formatPlain(value, 3)} AU`,
});
const massAxis = (at: number[]): FieldAxis => ({
  at,
  isLog: true,
  name: (
    <>
      planet mass, <JupiterMassText />
    </>
  ),
  plainName: 'planet mass',
  say: (value) => `${formatPlain(value, 3)} Jupiter masses`,
});

/** The limit at each place, or for everything beyond it, with the detections of the run. */
export function LimitMapAnswer({ asked, result }: AnswerProps<'limit-map'>) {
  const [view, setView] = useState<View>('node');
  const axes = useMemo(
    () => ({ x: auAxis(result.semiMajorAxisAu), y: massAxis(result.massMjup) }),
    [result],
  );
  const detections = useMemo(() => asked.inputs.companions.map(asMark), [asked]);
  const isTail = view === 'tail' && result.tail !== null;
  return (
    <>
      <div className="mb-3 flex flex-wrap items-end justify-between gap-x-6 gap-y-2">
        <p className="text-note text-ink2">
          {isTail
            ? 'Limit for the population cut to companions at least as heavy and as wide as each place.'
            : 'Limit if all companions were at one place and none had been detected.'}{' '}
          Fuller colour: stronger. Hatched: set by the prior.
        </p>
        <ConsequenceSwitch<View>
          label="Companions"
          isLabelHidden
          size="small"
          value={isTail ? 'tail' : 'node'}
          onChange={setView}
          options={[
            { value: 'node', label: 'at each place' },
            {
              value: 'tail',
              label: 'beyond each place',
              disabledReason:
                result.tail === null
                  ? 'This answer was asked without it: tick the box above and ask.'
                  : undefined,
            },
          ]}
        />
      </div>
      <LimitFieldChart
        {...axes}
        limit={isTail && result.tail ? result.tail : result.limit}
        isSetByPrior={isTail ? undefined : result.isSetByPrior}
        quantity={asked.quantity}
        levelLabel={describeLevel(asked.credibleLevel)}
        subject={
          isTail
            ? 'Upper limit for companions beyond each mass and semi-major axis'
            : 'Upper limit for companions at each mass and semi-major axis'
        }
        sayMore={(row, column) =>
          isTail
            ? []
            : [`${formatSignificant(result.summed[row][column], 3)} stars’ worth of sensitivity`]
        }
        detections={detections}
      />
      <AnswerNotes notes={result.notes} />
    </>
  );
}
