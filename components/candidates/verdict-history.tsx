'use client';

import { StateMark } from '@/components/ui/state-mark';
import { useMoment } from '@/components/ui/time-zone';
import { formatAsymmetric, formatPlain } from '@/lib/quantities/display';
import type { VerdictView } from '@/lib/schemas/candidates';
import { originWords, statusMarks, statusWords } from './status-words';

/** A value with its errors where there are any: "8.2 +2.9 −2.2 AU". */
export function withErrors(value: number, errors: [number, number] | null, unit: string): string {
  return errors === null
    ? `${formatPlain(value, 3)} ${unit}`.trim()
    : formatAsymmetric(value, errors[0], errors[1], unit);
}

/** The verdict that the values of the candidate come from: the newest that is no proposal. */
export const standingVerdict = (history: VerdictView[]) =>
  [...history].reverse().find(({ isProposal }) => !isProposal);

/** Mass and axis of a verdict, each with how it came about. */
export function placeWords(verdict: VerdictView): string {
  const { massMjup, massErrorsMjup, semiMajorAxisAu, semiMajorAxisErrorsAu } = verdict;
  const parts = [
    massMjup === null
      ? ''
      : `${withErrors(massMjup, massErrorsMjup, 'Jupiter masses')}, ${originWords(verdict.massFrom)}`,
    semiMajorAxisAu === null
      ? ''
      : `${withErrors(semiMajorAxisAu, semiMajorAxisErrorsAu, 'AU')}, ${originWords(verdict.semiMajorAxisFrom)}`,
  ];
  return parts.filter((part) => part !== '').join('; ');
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
          {placeWords(verdict) !== '' && <p className="text-ink3">{placeWords(verdict)}</p>}
        </li>
      ))}
    </ol>
  );
}
