'use client';

import { exportAddress } from '@/components/hooks/use-leaving';
import { sizeWords } from '@/components/releases/release-words';
import { StateMark } from '@/components/ui/state-mark';
import { useMoment } from '@/components/ui/time-zone';
import type { CollaborationExport } from '@/lib/schemas/leaving';

function Standing({ collaboration, one }: { collaboration: string; one: CollaborationExport }) {
  const moment = useMoment();
  if (one.byteLength !== null && one.expiresAt !== null) {
    return (
      <>
        <a href={exportAddress(collaboration, one.id)} download>
          Archive of {moment(one.finishedAt ?? one.askedAt)}
        </a>
        , {sizeWords(one.byteLength)}, until {moment(one.expiresAt, 'day')}
        <span className="block break-all text-ink3">SHA-256 {one.sha256}</span>
      </>
    );
  }
  const isOver = one.status === 'failed' || one.status === 'cancelled';
  return (
    <>
      <StateMark kind={isOver ? 'bad' : 'running'}>{isOver ? 'Not made' : 'Being made'}</StateMark>
      <span className="block text-ink3">
        {one.fault ?? `Asked for by ${one.askedBy}, ${moment(one.askedAt)}`}
      </span>
    </>
  );
}

/** Archives that can be fetched, and those on their way. */
export function LeavingExports({
  collaboration,
  exports,
}: {
  collaboration: string;
  exports: readonly CollaborationExport[];
}) {
  if (exports.length === 0) return null;
  return (
    <ul className="mt-4 text-note" aria-live="polite">
      {exports.map((one) => (
        <li key={one.id} className="border-rule border-b py-2.5">
          <Standing collaboration={collaboration} one={one} />
        </li>
      ))}
    </ul>
  );
}
