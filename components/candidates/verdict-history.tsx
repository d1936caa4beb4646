'use client';

import { JupiterMass } from '@/components/ui/notation';
import { StateMark } from '@/components/ui/state-mark';
import { useMoment } from '@/components/ui/time-zone';
import { formatAsymmetric, formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import type { VerdictView } from '@/lib/schemas/candidates';
import { originWords, statusMarks, statusWords } from './status-words';

/** A value with its errors where there are any: "8.2 +2.9 −2.2 AU". */
export function withErrors(value: number, errors: [number, number] | null, unit: string): string {
  return errors === null
    ? `${formatPlain(value, 3)}${unit === '' ? '' : `${THIN_SPACE}${unit}`}`
    : formatAsymmetric(value, errors[0], errors[1], unit);
}

/** The verdict that the values of the candidate come from: the newest that is no proposal. */
export const standingVerdict = (history: VerdictView[]) =>
  [...history].reverse().find(({ isProposal }) => !isProposal);

/** Mass and axis of a verdict, each with how it came about. */
function Place({ verdict }: { verdict: VerdictView }) {
  const { massMjup, massErrorsMjup, semiMajorAxisAu, semiMajorAxisErrorsAu } = verdict;
  if (massMjup === null && semiMajorAxisAu === null) return null;
  return (
    <p className="text-ink3">
      {massMjup !== null && (
        <>
          {withErrors(massMjup, massErrorsMjup, '')}
          {THIN_SPACE}
          <JupiterMass />, {originWords(verdict.massFrom)}
        </>
      )}
      {massMjup !== null && semiMajorAxisAu !== null && '; '}
      {semiMajorAxisAu !== null &&
        `${withErrors(semiMajorAxisAu, semiMajorAxisErrorsAu, 'AU')}, ${originWords(verdict.semiMajorAxisFrom)}`}
    </p>
  );
}

/** Every verdict and proposal, newest first: who, when, why, on what. */
export function VerdictHistory({ history }: { history: VerdictView[] }) {
  const moment = useMoment();
  if (history.length === 0) return <p className="py-2 text-ink3">Nobody has decided yet.</p>;
  return (
    <ol>
      {[...history].reverse().map((verdict) => (
        <li key={verdict.number} className="border-rule border-b py-2.5 text-[14px]">
          <div className="flex flex-wrap items-baseline gap-x-3">
            <StateMark kind={verdict.isProposal ? 'draft' : statusMarks[verdict.status]}>
              {verdict.isProposal && 'proposed: '}
              {statusWords[verdict.status]}
              {(verdict.status === 'candidate' || verdict.status === 'ambiguous') &&
                verdict.probability !== null &&
                `, ${formatPlain(verdict.probability)}`}
            </StateMark>
            <span className="text-ink3">
              {verdict.by ?? 'somebody who left'}, {moment(verdict.at, 'day')}
              {verdict.file !== null && `, ${verdict.file}`}
            </span>
          </div>
          <p className="mt-0.5 max-w-[72ch] break-words">{verdict.reason}</p>
          <Place verdict={verdict} />
        </li>
      ))}
    </ol>
  );
}
