import { z } from 'zod';
import { type ApiRoute, route, team } from './api-route';
import { idSchema, moment } from './common';
import { jobStatusSchema } from './jobs';

/** Days in which the deletion of a collaboration can be taken back. */
export const WAITING_DAYS = 7;

export const collaborationExportSchema = z.object({
  id: idSchema,
  status: jobStatusSchema,
  fault: z.string().nullable(),
  askedBy: z.string(),
  askedAt: moment,
  finishedAt: moment.nullable(),
  expiresAt: moment.nullable(),
  byteLength: z.number().nullable(),
  sha256: z.string().nullable(),
});
export type CollaborationExport = z.infer<typeof collaborationExportSchema>;

/** How a collaboration can be taken along, and whether it is about to be deleted. */
export const leavingSchema = z.object({
  name: z.string(),
  exports: z.array(collaborationExportSchema),
  deletion: z.object({ askedBy: z.string(), askedAt: moment, dueAt: moment }).nullable(),
  /** Public pages that would become tombstones. */
  publishedReleases: z.number(),
  members: z.number(),
});
export type LeavingView = z.infer<typeof leavingSchema>;

/** The collaboration's name, typed as it stands, as a sign that it is meant. */
export const askDeletionSchema = z.strictObject({ name: z.string().min(1).max(200) });

export const deleteAccountSchema = z.strictObject({ password: z.string().max(128) });

const leaving = `${team}/leaving`;
const ANSWER = { answer: leavingSchema };

/** Taking everything along, and going. */
export const leavingRoutes: readonly ApiRoute[] = [
  route('get', leaving, 'read', 'Archives of the collaboration, and whether it is to be deleted', {
    ...ANSWER,
  }),
  route('post', `${leaving}/exports`, 'write', 'Ask for the whole collaboration as one archive', {
    status: 202,
    ...ANSWER,
  }),
  route('get', `${leaving}/exports/{export}`, 'read', 'The archive, for seven days', {
    files: ['application/zip'],
  }),
  route('post', `${leaving}/deletion`, 'session', 'Delete the collaboration after seven days', {
    body: askDeletionSchema,
    status: 202,
    ...ANSWER,
  }),
  route('delete', `${leaving}/deletion`, 'session', 'Take the deletion back', { ...ANSWER }),
  route('get', '/api/v1/me/data', 'session', 'Everything that is stored about you', {
    answer: z.looseObject({ profile: z.unknown() }),
  }),
  route('post', '/api/v1/me/deletion', 'session', 'Delete your account; your work stays', {
    body: deleteAccountSchema,
  }),
];
