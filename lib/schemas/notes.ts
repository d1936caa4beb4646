import { z } from 'zod';
import { idSchema, moment, personRefSchema } from './common';

/** What a note can hang on, each by the key that addresses use: a slug, "A-31" or an id. */
export const noteItemKindSchema = z.enum(['survey', 'star', 'analysis', 'run', 'candidate']);
export type NoteItemKind = z.infer<typeof noteItemKindSchema>;
export const noteItemSchema = z.strictObject({
  kind: noteItemKindSchema,
  key: z.string().min(1).max(60),
});
export type NoteItem = z.infer<typeof noteItemSchema>;

/** Lines of text; what would hide or turn other text is refused, letters of every script are not. */
export const noteBodySchema = z
  .string()
  .max(4000, 'at most 4000 characters')
  .transform((text) => text.replace(/\r\n?/g, '\n').trim())
  .pipe(
    z
      .string()
      .min(1, 'something to read')
      .regex(
        /^(?:[^\p{Cc}\u202a-\u202e\u2066-\u2069]|[\n\t])*$/u,
        'text and line breaks, no other control or direction characters',
      ),
  );

/** People named in the text as "@name"; each must be a member. */
const mentionsSchema = z.array(idSchema).max(20, 'at most 20 people').default([]);

export const writeNoteSchema = z.strictObject({
  on: noteItemSchema,
  body: noteBodySchema,
  mentions: mentionsSchema,
  /** The note that this one answers. */
  replyTo: idSchema.optional(),
});
export type WriteNote = z.infer<typeof writeNoteSchema>;

/** New words for one's own note, or whether its thread is settled. */
export const changeNoteSchema = z
  .strictObject({
    body: noteBodySchema.optional(),
    mentions: mentionsSchema,
    isResolved: z.boolean().optional(),
  })
  .refine(({ body, isResolved }) => (body === undefined) !== (isResolved === undefined), {
    message: 'either body or isResolved',
  });
export type ChangeNote = z.infer<typeof changeNoteSchema>;

const noteFields = {
  id: idSchema,
  /** Null once the note was removed. */
  body: z.string().nullable(),
  mentions: z.array(personRefSchema),
  author: z.object({ id: idSchema.nullable(), name: z.string() }),
  at: moment,
  editedAt: moment.nullable(),
  /** Written by somebody else since this person last read the notes here. */
  isNew: z.boolean(),
  can: z.object({ change: z.boolean() }),
};
export const replySchema = z.object(noteFields);
export type NoteReply = z.infer<typeof replySchema>;
export const noteSchema = z.object({
  ...noteFields,
  resolved: z.object({ at: moment, by: z.string() }).nullable(),
  replies: z.array(replySchema),
});
export type NoteView = z.infer<typeof noteSchema>;
/** Of a note that begins a thread also whether it is settled. */
export const oneNoteSchema = z.object({
  ...noteFields,
  resolved: noteSchema.shape.resolved.optional(),
});
export type OneNote = z.infer<typeof oneNoteSchema>;
export const noteListSchema = z.object({
  /** Threads, the oldest first. */
  notes: z.array(noteSchema),
  new: z.number(),
  can: z.object({ write: z.boolean() }),
});
export type NoteList = z.infer<typeof noteListSchema>;
