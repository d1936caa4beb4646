'use client';

import { useEffect, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { ChangedMeanwhile } from '@/components/hooks/change';
import {
  changeNote,
  removeNote,
  seeNotes,
  settleNote,
  useNotes,
  writeNote,
} from '@/components/hooks/use-notes';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import type { NoteItem, NoteList } from '@/lib/schemas/notes';
import { NoteForm } from './note-form';
import { type NoteActions, NoteThread } from './note-thread';

interface NotesPanelProps {
  collaboration: string;
  /** What the notes hang on. */
  on: NoteItem;
  initial: NoteList;
}

function contextOf(notes: NoteList): string {
  const count = notes.notes.reduce((sum, { replies }) => sum + 1 + replies.length, 0);
  if (count === 0) return 'seen by every member';
  const news = notes.new === 0 ? '' : `, ${notes.new} new since you were here`;
  return `${count}${news}`;
}

/** What people say about a thing, at the foot of its page. */
export function NotesPanel({ collaboration, on, initial }: NotesPanelProps) {
  const { data: notes = initial, mutate } = useNotes(collaboration, on, initial);
  const [refusal, setRefusal] = useState<string | null>(null);
  const { kind, key } = on;
  const hasNew = initial.new > 0;
  useEffect(() => {
    // Read now, new no more at the next visit; the marks of this one stay.
    if (hasNew) void seeNotes(collaboration, { kind, key }).catch(() => undefined);
  }, [collaboration, kind, key, hasNew]);

  const take = async (answer: Promise<NoteList>) => {
    setRefusal(null);
    const next = await answer;
    await mutate(next, { revalidate: false });
  };
  const tell = async (answer: Promise<NoteList>) => {
    try {
      await take(answer);
    } catch (reason) {
      setRefusal(sentenceOf(reason));
      if (reason instanceof ChangedMeanwhile) await mutate();
    }
  };
  const actions: NoteActions = {
    reply: (to, words) => take(writeNote(collaboration, on, words, to)),
    change: (id, opened, words) => take(changeNote(collaboration, id, opened, words)),
    remove: (id) => tell(removeNote(collaboration, id)),
    settle: (id, isResolved) => tell(settleNote(collaboration, id, isResolved)),
  };
  return (
    <section className="mt-10 max-w-[860px]" aria-labelledby="notes">
      <SectionOpener id="notes" title="Notes" context={contextOf(notes)} />
      {refusal !== null && (
        <div className="mb-3">
          <Notice tone="bad" title="Nothing was changed." isAnnounced>
            {refusal}
          </Notice>
        </div>
      )}
      {notes.notes.length > 0 && (
        <ul className="mb-4">
          {notes.notes.map((thread) => (
            <NoteThread
              key={thread.id}
              collaboration={collaboration}
              thread={thread}
              canWrite={notes.can.write}
              actions={actions}
            />
          ))}
        </ul>
      )}
      {notes.can.write ? (
        <NoteForm
          collaboration={collaboration}
          label={notes.notes.length === 0 ? 'Begin with a note' : 'A new note'}
          verb="Write the note"
          onSend={async (words) => {
            await take(writeNote(collaboration, on, words));
            return true;
          }}
        />
      ) : (
        <p className="text-ink3 text-note">This collaboration is archived: notes can be read.</p>
      )}
    </section>
  );
}
