'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { type NoteText, useNameable } from '@/components/hooks/use-notes';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { MentionField } from './mention-field';
import { mentionedIn, type Nameable } from './mentions';

interface NoteFormProps {
  collaboration: string;
  label: string;
  verb: string;
  initial?: { body: string; mentions: readonly Nameable[] };
  isFocused?: boolean;
  /** Answers whether it was stored; what was not stays in the field. */
  onSend(text: NoteText): Promise<boolean>;
  onCancel?(): void;
}

/** Words, and who is named in them. */
export function NoteForm(props: NoteFormProps) {
  const { collaboration, label, verb, initial, isFocused, onSend, onCancel } = props;
  const [body, setBody] = useState(initial?.body ?? '');
  const [picked, setPicked] = useState<ReadonlySet<string>>(
    new Set(initial?.mentions.map(({ id }) => id)),
  );
  const [isBegun, setBegun] = useState(initial !== undefined);
  const { perform, isBusy, problem } = useAction();
  const people = useNameable(collaboration, isBegun);
  const isEmpty = body.trim() === '';
  const send = async () => {
    if (isEmpty || isBusy) return;
    await perform(async () => {
      const isStored = await onSend({ body, mentions: mentionedIn(body, people, picked) });
      if (!isStored) return;
      setBody('');
      setPicked(new Set());
    });
  };
  return (
    <form
      className="max-w-[72ch] print:hidden"
      onSubmit={(event) => {
        event.preventDefault();
        void send();
      }}
    >
      <MentionField
        label={label}
        value={body}
        people={people}
        rows={initial || isFocused ? 3 : 2}
        isFocused={isFocused}
        onChange={setBody}
        onPick={({ id }) => setPicked(new Set([...picked, id]))}
        onFocus={() => setBegun(true)}
        onSend={() => void send()}
      />
      {problem !== undefined && (
        <div className="mt-2">
          <Notice tone="bad" title="Nothing was stored." isAnnounced>
            {problem}
          </Notice>
        </div>
      )}
      {(isBegun || isFocused) && (
        <div className="mt-2 flex flex-wrap items-center gap-2">
          <Button
            type="submit"
            size="small"
            isBusy={isBusy}
            disabledReason={isEmpty ? 'Write something first' : undefined}
          >
            {verb}
          </Button>
          {onCancel !== undefined && (
            <Button size="small" variant="quiet" onClick={onCancel}>
              Cancel
            </Button>
          )}
          <span className="text-ink3 text-note">@ names somebody, who gets a message</span>
        </div>
      )}
    </form>
  );
}
