'use client';

import type { Editing } from '@/components/hooks/use-editing';
import { Notice } from '../notice';
import { TextAction } from '../text-action';
import { useMoment } from '../time-zone';

interface ChangedNoticeProps<Part> {
  editing: Editing<Part>;
  /** Each field by its label, as words. */
  words(part: NoInfer<Part>): Record<string, string>;
  /** Puts the newer one into the form. */
  onTake(now: NoInfer<Part>): void;
  /** Stores what was typed, now that it is known what it replaces. */
  onKeep(): void;
}

/**
 * Two people changed the same thing: who was first, both versions of each field that differs, and the
 * two ways on. What was typed stays in sight whichever is chosen.
 */
export function ChangedNotice<Part>({ editing, words, onTake, onKeep }: ChangedNoticeProps<Part>) {
  const moment = useMoment();
  const { conflict } = editing;
  if (conflict === null) return null;
  const { reason, isTaken } = conflict;
  const [now, mine] = [words(reason.now), words(conflict.mine)];
  const names = Object.keys(now).filter((name) => now[name] !== mine[name]);
  const { last } = reason;
  return (
    <Notice
      tone="warn"
      isAnnounced
      title={isTaken ? 'The newer one stands in the form.' : 'It was changed while you wrote.'}
      actions={
        !isTaken && (
          <>
            <TextAction
              onClick={() => {
                editing.goOn(true);
                onTake(reason.now);
              }}
            >
              Take the newer one
            </TextAction>
            <TextAction
              onClick={() => {
                editing.goOn(false);
                onKeep();
              }}
            >
              Keep mine over it
            </TextAction>
          </>
        )
      }
    >
      {last !== null && (
        <>
          Last: {last.person} {last.what}, {moment(last.at)}.{' '}
        </>
      )}
      {isTaken ? 'What you had written:' : 'Nothing was stored, and yours stands in the form.'}
      <dl className="mt-1.5 grid gap-y-1.5">
        {names.map((name) => (
          <div key={name}>
            <dt className="font-semibold">{name}</dt>
            {!isTaken && (
              <dd className="whitespace-pre-line [overflow-wrap:anywhere]">
                now: {now[name] || 'empty'}
              </dd>
            )}
            <dd className="whitespace-pre-line [overflow-wrap:anywhere]">
              yours: {mine[name] || 'empty'}
            </dd>
          </div>
        ))}
      </dl>
    </Notice>
  );
}
