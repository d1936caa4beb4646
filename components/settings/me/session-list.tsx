'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { endOneSession, endOtherSessions, useSessions } from '@/components/hooks/use-me';
import { Notice } from '@/components/ui/notice';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import type { SessionView } from '@/lib/schemas/account';
import { nameBrowser } from './browser-words';

/** Where the person is signed in, and how to end it there. */
export function SessionList({ initial, stamp }: { initial: SessionView[]; stamp: number }) {
  const { data: sessions = initial, mutate } = useSessions(initial);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [seenStamp, setSeenStamp] = useState(stamp);
  const moment = useMoment();
  if (seenStamp !== stamp) {
    setSeenStamp(stamp);
    void mutate();
  }
  const end = async (work: () => Promise<void>) => {
    setRefusal(null);
    try {
      await work();
      await mutate();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  return (
    <>
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <ul className="max-w-[560px]">
        {sessions.map((session) => (
          <li
            key={session.id}
            className="flex flex-wrap items-baseline gap-x-4 border-rule border-b py-2 text-note"
          >
            <span className="min-w-0 flex-1 basis-52">
              <b className="font-semibold">{nameBrowser(session.userAgent)}</b>
              <span className="block text-ink3">
                {session.isThisOne
                  ? 'this one'
                  : `last seen ${moment(session.lastSeenAt)}, since ${moment(session.createdAt)}`}
              </span>
            </span>
            {!session.isThisOne && (
              <TextAction onClick={() => void end(() => endOneSession(session.id))}>
                End it
                <span className="sr-only">, {nameBrowser(session.userAgent)}</span>
              </TextAction>
            )}
          </li>
        ))}
      </ul>
      {sessions.length > 1 && (
        <p className="mt-3 text-note">
          <TextAction onClick={() => void end(endOtherSessions)}>End all others</TextAction>
        </p>
      )}
    </>
  );
}
