'use client';

import { AgeShiftChart } from '@/components/charts/age-shift-chart';
import { modelLabel } from '@/components/runs/input-choices';
import { Link } from '@/components/ui/link';
import { StateMark } from '@/components/ui/state-mark';
import { describeLevel } from '@/lib/inference';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';

/** The limit against the age of all stars, a line a cooling model; what has no maps says why. */
export function AgesCoolingAnswer({ asked, result }: AnswerProps<'ages-cooling'>) {
  const { collaboration, analysis, quantity } = asked;
  const { ageShifts, models } = result;
  const faults = models.flatMap(({ name, shifts }) =>
    shifts.flatMap(({ fault }, i) =>
      fault === null ? [] : [{ key: `${name} ${ageShifts[i]}`, name, age: ageShifts[i], fault }],
    ),
  );
  return (
    <>
      <AgeShiftChart
        ageShifts={ageShifts}
        lines={models.map((model) => ({
          key: model.model,
          name: modelLabel(model, models),
          limit: model.shifts.map(({ limit }) => limit),
          exposure: model.shifts.map(({ exposure }) => exposure),
        }))}
        baseline={result.baseline}
        quantity={quantity}
        levelLabel={describeLevel(asked.credibleLevel)}
      />
      <p className="mt-3 max-w-[72ch] text-note">
        The maps are kept: under{' '}
        <Link href={`/${collaboration}/analyses/${analysis.key}`}>{analysis.key}</Link> the age of
        all stars and the cooling model are controls like the others, and every number follows them.
      </p>
      {faults.length > 0 && (
        <ul className="mt-3 grid gap-1">
          {faults.map(({ key, name, age, fault }) => (
            <li key={key}>
              <StateMark kind="warn">
                {name}, ages {age > 0 ? '+' : ''}
                {age} σ: {fault}
              </StateMark>
            </li>
          ))}
        </ul>
      )}
      <AnswerNotes notes={result.notes} />
    </>
  );
}
