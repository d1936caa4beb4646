'use client';

import useSWR from 'swr';
import type { NoteItem, NoteList } from '@/lib/schemas/notes';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { change } from './change';
import { request, requestNothing } from './request';

export function useNotes(collaboration: string, on: NoteItem, fallback: NoteList) {
  return useSWR(
    withQuery(apiPath(collaboration, 'notes'), { ...on }),
    (path) => request(path, answer('noteListSchema')),
    // What is new stays marked while the page is open: asked again only after a change.
    { fallbackData: fallback, revalidateOnMount: false, revalidateOnFocus: false },
  );
}

/** Who can be named in a note; asked for when somebody begins to write. */
export function useNameable(collaboration: string, isWanted: boolean) {
  const { data } = useSWR(
    isWanted ? apiPath(collaboration, 'members') : null,
    async (path: string) =>
      (await request(path, answer('membersSchema'))).members.map(({ person }) => person),
    { revalidateOnFocus: false },
  );
  return data ?? [];
}

export interface NoteText {
  body: string;
  mentions: string[];
}

export function writeNote(collaboration: string, on: NoteItem, text: NoteText, replyTo?: string) {
  return request(apiPath(collaboration, 'notes'), answer('noteListSchema'), {
    method: 'POST',
    body: { on, ...text, replyTo },
  });
}

export function changeNote(collaboration: string, id: string, opened: string, words: NoteText) {
  return change(apiPath(collaboration, 'notes', id), answer('oneNoteSchema'), {
    part: ({ body }) => body ?? '',
    opened,
    body: words,
    answer: answer('noteListSchema'),
  });
}

export function settleNote(collaboration: string, id: string, isResolved: boolean) {
  return change(apiPath(collaboration, 'notes', id), answer('oneNoteSchema'), {
    part: ({ resolved }) => (resolved ?? null) !== null,
    opened: !isResolved,
    body: { isResolved },
    answer: answer('noteListSchema'),
  });
}

export function removeNote(collaboration: string, id: string) {
  return request(apiPath(collaboration, 'notes', id), answer('noteListSchema'), {
    method: 'DELETE',
  });
}

export function seeNotes(collaboration: string, on: NoteItem) {
  return requestNothing(apiPath(collaboration, 'notes', 'seen'), { method: 'POST', body: on });
}
