import { activityPageSchema, activityQuerySchema } from './activity';
import { type ApiRoute, route, team } from './api-route';
import { auditExportQuerySchema } from './audit';
import {
  changeMailPreferenceSchema,
  failedMessagesSchema,
  mailPreferencesSchema,
  stopMailSchema,
  stoppedMailSchema,
} from './mail';
import {
  changeNoteSchema,
  noteItemSchema,
  noteListSchema,
  oneNoteSchema,
  writeNoteSchema,
} from './notes';
import { changeSettingsSchema, settingsSchema } from './settings';
import { workSchema } from './work';

/** Notes, news, settings and mail. */
export const talkRoutes: ApiRoute[] = [
  route('get', `${team}/notes`, 'read', 'Notes on a thing, thread by thread', {
    query: noteItemSchema,
    answer: noteListSchema,
  }),
  route('post', `${team}/notes`, 'write', 'Write a note, or answer one', {
    body: writeNoteSchema,
    status: 201,
    answer: noteListSchema,
  }),
  route('post', `${team}/notes/seen`, 'write', 'Say that the notes on a thing are read', {
    body: noteItemSchema,
  }),
  route('get', `${team}/notes/{note}`, 'read', 'One note', { answer: oneNoteSchema }),
  route('patch', `${team}/notes/{note}`, 'write', 'Change your note, or settle a thread', {
    body: changeNoteSchema,
    answer: noteListSchema,
  }),
  route('delete', `${team}/notes/{note}`, 'write', 'Remove your note; a mark stays', {
    answer: noteListSchema,
  }),
  route('get', `${team}/activity`, 'read', 'What happened, newest first', {
    query: activityQuerySchema,
    answer: activityPageSchema,
  }),
  route('get', `${team}/audit/export`, 'read', 'The log as CSV or JSON', {
    query: auditExportQuerySchema,
    files: ['text/csv', 'application/json'],
  }),
  route('get', `${team}/settings`, 'read', 'Settings of the collaboration', {
    answer: settingsSchema,
  }),
  route('patch', `${team}/settings`, 'write', 'Change settings; archive it or open it again', {
    body: changeSettingsSchema,
    answer: settingsSchema,
  }),
  route('get', `${team}/work`, 'read', 'What waits, runs and failed, and the workers', {
    answer: workSchema,
  }),
  route('get', `${team}/mail`, 'read', 'Messages that could not be delivered', {
    answer: failedMessagesSchema,
  }),
  route('post', `${team}/mail/{message}/retry`, 'write', 'Try to deliver one again'),
  route('get', '/api/v1/me/mail', 'session', 'Which mail you get', {
    answer: mailPreferencesSchema,
  }),
  route('patch', '/api/v1/me/mail', 'session', 'Stop a kind of mail, or want it again', {
    body: changeMailPreferenceSchema,
    answer: mailPreferencesSchema,
  }),
  route('post', '/api/v1/mail/stop', 'open', 'Stop a kind of mail by the link in a message', {
    body: stopMailSchema,
    answer: stoppedMailSchema,
  }),
];
