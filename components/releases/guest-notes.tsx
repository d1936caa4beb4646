'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { writeGuestNote } from '@/components/hooks/use-releases';
import { formatDay } from '@/components/runs/time-words';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAreaField } from '@/components/ui/text-area-field';
import { TextField } from '@/components/ui/text-field';
import type { GuestPage } from '@/lib/schemas/release-page';

/** Notes of whoever holds the link; the collaboration reads them beside the link. */
export function GuestNotes({ token, guest }: { token: string; guest: GuestPage['guest'] }) {
  const [notes, setNotes] = useState(guest.notes);
  const [name, setName] = useState('');
  const [body, setBody] = useState('');
  const { perform, isBusy, problem } = useAction();
  const send = () =>
    perform(async () => {
      const { createdAt: at, ...note } = await writeGuestNote(token, { name, body });
      setNotes([...notes, { ...note, at }]);
      setBody('');
    });
  return (
    <section className="mt-9 print:hidden">
      <SectionOpener
        title="Notes to the collaboration"
        context={`read by its members; this link ends on ${formatDay(guest.expiresAt)}`}
      />
      <ul className="mb-4 grid gap-3">
        {notes.map((note) => (
          <li key={note.id} className="max-w-[72ch] border-rule border-b pb-3">
            <p className="text-ink3 text-note">
              {note.name}, {formatDay(note.at)}
            </p>
            <p className="whitespace-pre-wrap">{note.body}</p>
          </li>
        ))}
      </ul>
      <form
        className="grid max-w-[560px] gap-3"
        onSubmit={(event) => {
          event.preventDefault();
          void send();
        }}
      >
        <TextField
          label="Signed as"
          hint="such as referee 1"
          value={name}
          maxLength={100}
          required
          onChange={(event) => setName(event.target.value)}
        />
        <TextAreaField
          label="Note"
          value={body}
          rows={4}
          maxLength={10_000}
          required
          onChange={(event) => setBody(event.target.value)}
        />
        {problem !== undefined && (
          <Notice tone="bad" title="The note was not sent." isAnnounced>
            {problem}
          </Notice>
        )}
        <div>
          <Button type="submit" isBusy={isBusy}>
            Send the note
          </Button>
        </div>
      </form>
    </section>
  );
}
