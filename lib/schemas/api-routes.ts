import { z } from 'zod';
import {
  changePasswordSchema,
  collaborationSchema,
  joinedSchema,
  joinSchema,
  sessionSchema,
  updateCollaborationSchema,
  updateMeSchema,
} from './account';
import { accountRoutes } from './account-access';
import {
  analysisSchema,
  copyAnalysisSchema,
  createAnalysisSchema,
  updateAnalysisSchema,
} from './analyses';
import { type ApiRoute, listOf, route, team } from './api-route';
import { auditPageSchema, auditQuerySchema } from './audit';
import { candidateRoutes } from './candidate-routes';
import { pageSchema, roleSchema } from './common';
import { depositRoutes } from './deposit-routes';
import { exampleRoutes } from './example-routes';
import { exerciseRoutes } from './exercise-routes';
import { exportRoutes } from './export-routes';
import { jobSchema } from './jobs';
import { leavingRoutes } from './leaving';

import {
  changeRolesSchema,
  createCollaborationSchema,
  createTokenSchema,
  invitationOfferSchema,
  invitationSchema,
  inviteSchema,
  memberSchema,
  meSchema,
  newTokenSchema,
  signUpSchema,
  suspensionSchema,
  tokenSchema,
} from './people';
import {
  createVersionSchema,
  populationListSchema,
  populationVersionQuerySchema,
  sharePopulationSchema,
} from './population-versions';
import { createPopulationSchema, populationSchema } from './populations';
import { releaseRoutes } from './release-routes';
import { runSchema, runSummarySchema } from './runs';
import { sampleRoutes } from './sample-routes';
import { searchRoutes } from './search-routes';

import { sharingRoutes } from './sharing-routes';
import { starRoutes } from './star-routes';
import { statementRoutes } from './statement-routes';
import {
  createStudySchema,
  studyMapsQuerySchema,
  studyQuerySchema,
  studySchema,
  studySummarySchema,
} from './studies';
import { surveyRoutes } from './survey-routes';

import { talkRoutes } from './talk-routes';

export type { ApiMethod, ApiRoute } from './api-route';

const bytes = ['application/octet-stream'];
const membershipSchema = z.object({
  slug: z.string(),
  name: z.string(),
  roles: z.array(roleSchema),
});

const people: ApiRoute[] = [
  route('post', '/api/v1/sign-up', 'open', 'Make an account', {
    body: signUpSchema,
    status: 201,
    answer: meSchema,
  }),
  route('get', '/api/v1/me', 'read', 'Who asks, and where they are a member', { answer: meSchema }),
  route('patch', '/api/v1/me', 'session', 'Change your name', {
    body: updateMeSchema,
    answer: meSchema,
  }),
  route('post', '/api/v1/me/password', 'session', 'Change your password; other sessions end', {
    body: changePasswordSchema,
  }),
  route('get', '/api/v1/me/sessions', 'session', 'Where you are signed in', {
    answer: listOf('sessions', sessionSchema),
  }),
  route('delete', '/api/v1/me/sessions', 'session', 'End every other session'),
  route('delete', '/api/v1/me/sessions/{session}', 'session', 'End one session'),
  route('get', '/api/v1/join/{code}', 'open', 'What an invitation offers', {
    answer: invitationOfferSchema,
  }),
  route('post', '/api/v1/join/{code}', 'open', 'Accept an invitation', {
    body: joinSchema,
    status: 201,
    answer: joinedSchema,
  }),
  route('get', '/api/v1/collaborations', 'read', 'Collaborations that you are a member of', {
    answer: listOf('collaborations', membershipSchema),
  }),
  route('post', '/api/v1/collaborations', 'session', 'Begin a collaboration', {
    body: createCollaborationSchema,
    status: 201,
    answer: collaborationSchema,
  }),
  route('get', team, 'read', 'One collaboration', { answer: collaborationSchema }),
  route('patch', team, 'write', 'Rename the collaboration', {
    body: updateCollaborationSchema,
    answer: collaborationSchema,
  }),
  route('get', `${team}/members`, 'read', 'Members and their roles', {
    answer: listOf('members', memberSchema),
  }),
  route('get', `${team}/members/{member}`, 'read', 'One member', { answer: memberSchema }),
  route('patch', `${team}/members/{member}`, 'write', 'Change the roles of a member', {
    body: changeRolesSchema,
    answer: memberSchema,
  }),
  route('post', `${team}/members/{member}/suspension`, 'write', 'Let the access of a member rest', {
    body: suspensionSchema,
    answer: memberSchema,
  }),
  route('delete', `${team}/members/{member}`, 'write', 'Remove a member, or leave'),
  route('get', `${team}/invitations`, 'read', 'Invitations and their states', {
    answer: listOf('invitations', invitationSchema),
  }),
  route('post', `${team}/invitations`, 'write', 'Invite somebody by e-mail', {
    body: inviteSchema,
    status: 201,
    answer: invitationSchema,
  }),
  route('delete', `${team}/invitations/{invitation}`, 'write', 'Revoke an invitation'),
  route('post', `${team}/invitations/{invitation}/resend`, 'write', 'Send it with a new code', {
    answer: invitationSchema,
  }),
  route('get', `${team}/tokens`, 'read', 'Your own access tokens', {
    answer: listOf('tokens', tokenSchema),
  }),
  route('post', `${team}/tokens`, 'session', 'Make an access token; its text is shown once', {
    body: createTokenSchema,
    status: 201,
    answer: newTokenSchema,
    tellsSecret: true,
  }),
  route('delete', `${team}/tokens/{token}`, 'write', 'Revoke one of your tokens'),
  route('get', `${team}/audit`, 'read', 'Who did what, newest first', {
    query: auditQuerySchema,
    answer: auditPageSchema,
  }),
];

const analyses: ApiRoute[] = [
  route('get', `${team}/populations`, 'read', 'Every version of every population', {
    answer: populationListSchema,
  }),
  route('post', `${team}/populations`, 'write', 'Save a population', {
    body: createPopulationSchema,
    status: 201,
    answer: populationSchema,
  }),
  route('get', `${team}/populations/{population}`, 'read', 'The newest version, or one of them', {
    query: populationVersionQuerySchema,
    answer: populationSchema,
  }),
  route('patch', `${team}/populations/{population}`, 'write', 'Share a version with all', {
    query: populationVersionQuerySchema,
    body: sharePopulationSchema,
    answer: populationSchema,
  }),
  route('post', `${team}/populations/{population}/versions`, 'write', 'Save a new version', {
    body: createVersionSchema,
    status: 201,
    answer: populationSchema,
  }),
  route('get', `${team}/analyses`, 'read', 'Analyses and their runs', {
    answer: listOf('analyses', analysisSchema),
  }),
  route('post', `${team}/analyses`, 'write', 'Create an analysis', {
    body: createAnalysisSchema,
    status: 201,
    answer: analysisSchema,
  }),
  route('get', `${team}/analyses/{analysis}`, 'read', 'One analysis', { answer: analysisSchema }),
  route('patch', `${team}/analyses/{analysis}`, 'write', 'Change an analysis', {
    body: updateAnalysisSchema,
    answer: analysisSchema,
  }),
  route('delete', `${team}/analyses/{analysis}`, 'write', 'Delete a draft'),
  route('post', `${team}/analyses/{analysis}/copy`, 'write', 'Copy to a draft of your own', {
    body: copyAnalysisSchema,
    status: 201,
    answer: analysisSchema,
  }),
  route('get', `${team}/analyses/{analysis}/runs`, 'read', 'Runs, newest first', {
    answer: listOf('runs', runSummarySchema),
  }),
  route('post', `${team}/analyses/{analysis}/runs`, 'run', 'Start a run', {
    status: 201,
    answer: runSummarySchema,
  }),
  route('get', `${team}/runs/{run}`, 'read', 'A run with its inputs and its result', {
    answer: runSchema,
  }),
  route('get', `${team}/runs/{run}/maps`, 'read', 'All maps of a run: uint16, little-endian', {
    files: bytes,
  }),
  route('post', `${team}/figures`, 'read', 'A figure of the product, sent as SVG, as PDF', {
    isUpload: true,
    uploadType: 'image/svg+xml',
    files: ['application/pdf'],
  }),
  route('get', `${team}/runs/{run}/studies`, 'read', 'Further questions of a run, newest first', {
    answer: listOf('studies', studySummarySchema),
  }),
  route('post', `${team}/runs/{run}/studies`, 'run', 'Ask a finished run a further question', {
    body: createStudySchema,
    status: 201,
    answer: studySummarySchema,
  }),
  route('get', `${team}/studies`, 'read', 'Further questions of all runs, newest first', {
    query: studyQuerySchema,
    answer: listOf('studies', studySummarySchema),
  }),
  route('get', `${team}/studies/{study}`, 'read', 'A further question with its result', {
    answer: studySchema,
  }),
  route(
    'get',
    `${team}/studies/{study}/maps`,
    'read',
    'Maps of the run under other ages or cooling: uint16, little-endian',
    { query: studyMapsQuerySchema, files: bytes },
  ),
  route('delete', `${team}/studies/{study}`, 'write', 'Delete a further question and its result'),
  route('get', `${team}/jobs`, 'read', 'Jobs, open ones first', {
    query: pageSchema,
    answer: listOf('jobs', jobSchema),
  }),
  route('get', `${team}/jobs/{job}`, 'read', 'One job and how far it is', { answer: jobSchema }),
  route('post', `${team}/jobs/{job}/cancel`, 'run', 'Stop a job', { answer: jobSchema }),
  route('post', `${team}/jobs/{job}/retry`, 'run', 'Start a stopped or failed job again', {
    answer: jobSchema,
  }),
];

const itself = route('get', '/api/v1/openapi.json', 'open', 'This document', {
  answer: z.record(z.string(), z.unknown()),
});

/** Every method of every address below /api/v1. */
export const apiRoutes: readonly ApiRoute[] = [
  itself,
  ...people,
  ...accountRoutes,
  ...surveyRoutes,
  ...releaseRoutes,
  ...depositRoutes,
  ...leavingRoutes,
  ...sampleRoutes,
  ...searchRoutes,
  ...analyses,
  ...exportRoutes,
  ...candidateRoutes,
  ...sharingRoutes,
  ...starRoutes,
  ...exampleRoutes,
  ...exerciseRoutes,
  ...statementRoutes,
  ...talkRoutes,
];
