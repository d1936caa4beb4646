'use client';

import { type ReactNode, useState } from 'react';
import { useEditing } from '@/components/hooks/use-editing';
import type { NoteText as Words } from '@/components/hooks/use-notes';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { Icon } from '@/components/ui/icon';
import { TextAction } from '@/components/ui/text-action';
import { useMoment } from '@/components/ui/time-zone';
import type { NoteReply, NoteView } from '@/lib/schemas/notes';
import { NoteForm } from './note-form';
import { NoteText } from './note-text';

/** What can be done with notes; each answers when the list is new. */
export interface NoteActions {
  reply(to: string, words: Words): Promise<void>;
  /** @param opened the words that were there when the change began */
  change(id: string, opened: string, words: Words): Promise<void>;
  remove(id: string): Promise<void>;
  settle(id: string, isResolved: boolean): Promise<void>;
}

function NewMark() {
  return (
    <span className="inline-flex items-center gap-1 font-semibold text-act text-chart">
      <Icon name="diamond" size={10} />
      new
    </span>
  );
}

interface NoteProps {
  collaboration: string;
  note: NoteReply;
  actions: NoteActions;
  /** Beside those of the note itself. */
  tools?: ReactNode;
}

function Note({ collaboration, note, actions, tools }: NoteProps) {
  const [mode, setMode] = useState<'read' | 'change' | 'remove'>('read');
  const moment = useMoment();
  const { author, body } = note;
  return (
    <article id={`note-${note.id}`} className="scroll-mt-4 py-2 target:bg-act-soft">
      <header className="flex flex-wrap items-baseline gap-x-2 text-note">
        <b className="font-semibold">
          <bdi>{author.name}</bdi>
        </b>
        <time dateTime={note.at} className="text-ink3">
          {moment(note.at)}
        </time>
        {note.editedAt !== null && body !== null && <span className="text-ink3">changed</span>}
        {note.isNew && <NewMark />}
      </header>
      {body === null && <p className="text-ink3 italic">Removed by the person who wrote it.</p>}
      {body !== null && mode !== 'change' && <NoteText body={body} mentions={note.mentions} />}
      {body !== null && mode === 'change' && (
        <NoteChange
          collaboration={collaboration}
          note={{ ...note, body }}
          actions={actions}
          onClose={() => setMode('read')}
        />
      )}
      {mode === 'remove' && (
        <p className="mt-1 flex flex-wrap items-center gap-x-4 text-note">
          The words go, and a mark stays that there was a note.
          <TextAction onClick={() => void actions.remove(note.id).finally(() => setMode('read'))}>
            Remove it
          </TextAction>
          <TextAction onClick={() => setMode('read')}>Keep it</TextAction>
        </p>
      )}
      {mode === 'read' && (
        <div className="flex flex-wrap gap-x-4 text-note">
          {tools}
          {note.can.change && (
            <>
              <TextAction onClick={() => setMode('change')}>Change</TextAction>
              <TextAction onClick={() => setMode('remove')}>Remove</TextAction>
            </>
          )}
        </div>
      )}
    </article>
  );
}

interface ChangeProps extends Omit<NoteProps, 'tools' | 'note'> {
  note: NoteReply & { body: string };
  onClose(): void;
}

/** New words for a note; another window of the same person may have been first. */
function NoteChange({ collaboration, note, actions, onClose }: ChangeProps) {
  const editing = useEditing(note.body);
  const [held, setHeld] = useState<Words>({ body: note.body, mentions: [] });
  const [shown, setShown] = useState(note.body);
  const save = async (words: Words) => {
    setHeld(words);
    const isStored = await editing.attempt(words.body, (opened) =>
      actions.change(note.id, opened, words),
    );
    if (isStored) onClose();
    return isStored;
  };
  return (
    <>
      <NoteForm
        key={shown}
        collaboration={collaboration}
        label="New words"
        verb="Save"
        initial={{ body: shown, mentions: note.mentions }}
        isFocused
        onSend={save}
        onCancel={onClose}
      />
      <div className="mt-2 empty:hidden">
        <ChangedNotice
          editing={editing}
          words={(text) => ({ Note: text })}
          onTake={setShown}
          onKeep={() => void save(held)}
        />
      </div>
    </>
  );
}

interface ThreadProps {
  collaboration: string;
  thread: NoteView;
  canWrite: boolean;
  actions: NoteActions;
}

/** A note with its answers; once settled it folds to a line. */
export function NoteThread({ collaboration, thread, canWrite, actions }: ThreadProps) {
  const [isAnswering, setAnswering] = useState(false);
  const hasNew = thread.isNew || thread.replies.some(({ isNew }) => isNew);
  const tools = canWrite && (
    <>
      <TextAction onClick={() => setAnswering(true)}>Answer</TextAction>
      <TextAction onClick={() => void actions.settle(thread.id, thread.resolved === null)}>
        {thread.resolved === null ? 'Settle' : 'Open again'}
      </TextAction>
    </>
  );
  const content = (
    <>
      <Note collaboration={collaboration} note={thread} actions={actions} tools={tools} />
      {(thread.replies.length > 0 || isAnswering) && (
        <div className="ml-1 border-rule border-l-2 pl-4">
          {thread.replies.map((reply) => (
            <Note key={reply.id} collaboration={collaboration} note={reply} actions={actions} />
          ))}
          {isAnswering && (
            <div className="py-2">
              <NoteForm
                collaboration={collaboration}
                label="Your answer"
                verb="Answer"
                isFocused
                onSend={async (words) => {
                  await actions.reply(thread.id, words);
                  setAnswering(false);
                  return true;
                }}
                onCancel={() => setAnswering(false)}
              />
            </div>
          )}
        </div>
      )}
    </>
  );
  return (
    <li className="border-rule border-b py-1.5">
      {thread.resolved === null ? (
        content
      ) : (
        <details open={hasNew || undefined}>
          <summary className="min-h-9 py-2 text-ink2 text-note">
            <span className="text-ok">
              <Icon name="ok" size={14} />
            </span>{' '}
            Settled by <bdi>{thread.resolved.by}</bdi>: {1 + thread.replies.length}{' '}
            {thread.replies.length === 0 ? 'note' : 'notes'} by <bdi>{thread.author.name}</bdi>
            {thread.replies.length > 0 && ' and others'}
          </summary>
          {content}
        </details>
      )}
    </li>
  );
}
