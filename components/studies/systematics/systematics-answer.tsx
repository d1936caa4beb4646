'use client';

import { useMemo } from 'react';
import { ChangeRowsChart } from '@/components/charts/change-rows-chart';
import { StateMark } from '@/components/ui/state-mark';
import { describeLevel } from '@/lib/inference';
import { AnswerNotes } from '../answer-notes';
import type { AnswerProps } from '../kind-entry';
import { keyOf } from './changes-offered';
import { changeRows, sortRows } from './systematics-rows';

/** One assumption at a time, the largest move first; what has no limit says why. */
export function SystematicsAnswer({ asked, result }: AnswerProps<'systematics'>) {
  const { quantity } = asked;
  const { stars } = asked.result;
  const { answered, faulty } = useMemo(() => sortRows(result.rows), [result]);
  const rows = useMemo(
    () => changeRows(answered, result, stars, quantity),
    [answered, result, stars, quantity],
  );
  const kept = rows.filter(({ note }) => note !== undefined);
  return (
    <>
      {rows.length > 0 && (
        <ChangeRowsChart
          rows={rows}
          baseline={result.baseline}
          quantity={quantity}
          levelLabel={describeLevel(asked.credibleLevel)}
        />
      )}
      <p className="mt-3 max-w-[72ch] text-note">
        A row is one assumption that could be wrong, not an error bar of the limit: rows are never
        added in quadrature. Only what the data rest on is varied here; indices, prior and
        detections move the limit too, and are moved by the controls of the result.
      </p>
      {faulty.length > 0 && (
        <ul className="mt-3 grid gap-1">
          {faulty.map((row) => (
            <li key={keyOf(row.change)}>
              <StateMark kind="warn">
                {row.label}: {row.fault ?? 'no limit'}
              </StateMark>
            </li>
          ))}
        </ul>
      )}
      {kept.length > 0 && (
        <ul className="mt-3 grid max-w-[72ch] gap-1 text-ink2 text-note">
          {kept.map(({ key, name, note }) => (
            <li key={key}>
              {name}: {note}
            </li>
          ))}
        </ul>
      )}
      <AnswerNotes notes={result.notes} />
    </>
  );
}
