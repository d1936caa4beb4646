'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { endOneSession, endOtherSessions, useSessions } from '@/components/hooks/use-me';
import { Notice } from '@/components/ui/notice';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import type { SessionView } from '@/lib/schemas/account';
import { nameBrowser } from './browser-words';

const NEWEST_SHOWN = 5;

/** The newest and the present one stay in sight; the others, newest first, lie behind a fold. */
export function foldSessions(sessions: SessionView[]): {
  shown: SessionView[];
  rest: SessionView[];
} {
  const isShown = (one: SessionView, at: number) => at < NEWEST_SHOWN || one.isThisOne;
  return {
    shown: sessions.filter(isShown),
    rest: sessions.filter((one, at) => !isShown(one, at)),
  };
}

function SessionLines({
  sessions,
  onEnd,
}: {
  sessions: SessionView[];
  onEnd(session: SessionView): void;
}) {
  const moment = useMoment();
  return (
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
            <TextAction onClick={() => onEnd(session)}>
              End it
              <span className="sr-only">, {nameBrowser(session.userAgent)}</span>
            </TextAction>
          )}
        </li>
      ))}
    </ul>
  );
}

/** Where the person is signed in, and how to end it there. */
export function SessionList({ initial, stamp }: { initial: SessionView[]; stamp: number }) {
  const { data: sessions = initial, mutate } = useSessions(initial);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [seenStamp, setSeenStamp] = useState(stamp);
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
  const endOne = ({ id }: SessionView) => void end(() => endOneSession(id));
  const { shown, rest } = foldSessions(sessions);
  return (
    <>
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      <SessionLines sessions={shown} onEnd={endOne} />
      {rest.length > 0 && (
        <details>
          <summary className="w-max py-2 text-act text-note max-md:py-3">
            {rest.length} more
          </summary>
          <SessionLines sessions={rest} onEnd={endOne} />
        </details>
      )}
      {sessions.length > 1 && (
        <p className="mt-3 text-note">
          <TextAction onClick={() => void end(endOtherSessions)}>End all others</TextAction>
        </p>
      )}
    </>
  );
}
