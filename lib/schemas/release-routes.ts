import { z } from 'zod';
import { type ApiRoute, listOf, route, team } from './api-route';
import { bundleImportSchema } from './bundles';
import {
  createGuestLinkSchema,
  createReleaseSchema,
  freezeRunSchema,
  freezeStandingSchema,
  guestLinkSchema,
  guestNoteSchema,
  newGuestLinkSchema,
  releaseSchema,
  updateReleaseSchema,
  withdrawReleaseSchema,
  writeGuestNoteSchema,
} from './releases';

const run = `${team}/runs/{run}`;
const release = `${team}/releases/{release}`;
const released = { answer: releaseSchema };

/** Freezing, releases, guests, and bundles on their way out and in. */
export const releaseRoutes: readonly ApiRoute[] = [
  route('get', `${run}/freeze`, 'read', 'How a run stands to being frozen', {
    answer: freezeStandingSchema,
  }),
  route('post', `${run}/freeze`, 'write', 'Freeze a run with its inputs, for good', {
    body: freezeRunSchema,
    status: 201,
    answer: freezeStandingSchema,
  }),
  route('get', `${run}/bundle`, 'read', 'Everything a run rests on, enough to compute it again', {
    files: ['application/zip'],
  }),
  route('get', `${team}/releases`, 'read', 'Releases, the newest first', {
    answer: listOf('releases', releaseSchema),
  }),
  route('post', `${team}/releases`, 'write', 'Begin a release of frozen runs', {
    body: createReleaseSchema,
    status: 201,
    ...released,
  }),
  route('get', release, 'read', 'A release, by its key or id', released),
  route('patch', release, 'write', 'Change a draft; both signatures are asked for again', {
    body: updateReleaseSchema,
    ...released,
  }),
  route('delete', release, 'write', 'Delete a draft of a release', { status: 204 }),
  route('post', `${release}/sign-off`, 'write', 'Sign a release off, as a statistician', released),
  route('post', `${release}/agree`, 'write', 'Agree to a release that another froze', released),
  route('post', `${release}/check`, 'write', 'Run a release again from its inputs', released),
  route('post', `${release}/publish`, 'write', 'Make a checked release public', released),
  route('post', `${release}/withdraw`, 'write', 'Take a release back; its page says why', {
    body: withdrawReleaseSchema,
    ...released,
  }),
  route('get', `${team}/guest-links`, 'read', 'Links of guests with the notes they left', {
    answer: listOf('links', guestLinkSchema),
  }),
  route('post', `${team}/guest-links`, 'write', 'Give a guest a link; its address is told once', {
    tellsSecret: true,
    body: createGuestLinkSchema,
    status: 201,
    answer: newGuestLinkSchema,
  }),
  route('delete', `${team}/guest-links/{link}`, 'write', 'End a guest link', { status: 204 }),
  route('get', `${team}/bundles`, 'read', 'Runs made anew from bundles, and whether they agree', {
    answer: listOf('imports', bundleImportSchema),
  }),
  route(
    'post',
    `${team}/bundles`,
    'write',
    'Bring a bundle in: surveys, population, analysis, run',
    {
      query: z.strictObject({ run: z.string().max(100).optional() }),
      isUpload: true,
      status: 201,
      answer: bundleImportSchema,
    },
  ),
  route('get', '/api/v1/releases/{code}/files/{file}', 'open', 'A file of a published release', {
    files: ['application/zip', 'text/csv', 'text/plain', 'application/octet-stream'],
  }),
  route('post', '/api/v1/guest/{token}/notes', 'open', 'Leave a note with a guest link', {
    body: writeGuestNoteSchema,
    status: 201,
    answer: guestNoteSchema,
  }),
];
