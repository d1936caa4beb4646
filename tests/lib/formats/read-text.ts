import {
  type Note,
  placeOf,
  type ReadContext,
  type ReadResult,
  type RecordsOfKind,
  readUpload,
  type UploadKind,
} from '@/lib/formats';

export const bytesOf = (text: string) => new TextEncoder().encode(text);

export function readText(
  kind: UploadKind,
  text: string,
  context: Partial<ReadContext> = {},
): ReadResult {
  return readUpload(bytesOf(text), { fileName: 'file.csv', kind, ...context });
}

/** The records and notes of a text that must read. */
export function recordsOf<K extends UploadKind>(
  kind: K,
  text: string,
  context: Partial<ReadContext> = {},
): { records: RecordsOfKind[K]; notes: Note[] } {
  const result = readText(kind, text, context);
  if (!result.ok) throw new Error(JSON.stringify(result.faults));
  return { records: result.records as RecordsOfKind[K], notes: result.notes };
}

/** `code at place` of each fault of a text that must not read. */
export function faultsOf(
  kind: UploadKind,
  text: string,
  context: Partial<ReadContext> = {},
): string[] {
  const result = readText(kind, text, context);
  if (result.ok) throw new Error('the text was accepted');
  return result.faults.map((fault) => `${fault.code} at ${placeOf(fault)}`);
}

/** `code at place` of each note of one level. */
export function notesOf(notes: Note[], level: Note['level']): string[] {
  return notes
    .filter((note) => note.level === level)
    .map((note) => `${note.code} at ${placeOf(note)}`);
}
