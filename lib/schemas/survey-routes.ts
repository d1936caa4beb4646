import { z } from 'zod';
import { type ApiRoute, listOf, route, team } from './api-route';
import { pageSchema } from './common';
import { jobSchema } from './jobs';
import { surveyMapsSchema } from './map-states';
import { overviewSchema } from './overview';
import { mapViewSchema } from './sensitivity';
import {
  companionSchema,
  coolingTableSchema,
  createSurveySchema,
  leaveOutSchema,
  surveyListSchema,
  surveySchema,
  targetListSchema,
  targetSchema,
  updateSurveySchema,
} from './surveys';
import {
  columnMappingSchema,
  dependentsSchema,
  unfinishedFileSchema,
  unfinishedQuerySchema,
  uploadQuerySchema,
  uploadSchema,
  uploadSettingsSchema,
} from './uploads';

const bytes = ['application/octet-stream'];
const part = { isUpload: true, uploadType: 'application/offset+octet-stream' } as const;

/** Surveys, their targets and maps, and the files that bring them. */
export const surveyRoutes: ApiRoute[] = [
  route('get', `${team}/overview`, 'read', 'Where the collaboration stands', {
    answer: overviewSchema,
  }),
  route('get', `${team}/surveys`, 'read', 'Surveys, every star counted once', {
    answer: surveyListSchema,
  }),
  route('post', `${team}/surveys`, 'write', 'Create a survey', {
    body: createSurveySchema,
    status: 201,
    answer: surveySchema,
  }),
  route('get', `${team}/surveys/{survey}`, 'read', 'One survey', { answer: surveySchema }),
  route('patch', `${team}/surveys/{survey}`, 'write', 'Change a survey', {
    body: updateSurveySchema,
    answer: surveySchema,
  }),
  route('get', `${team}/surveys/{survey}/targets`, 'read', 'Targets of a survey', {
    query: pageSchema,
    answer: targetListSchema,
  }),
  route('get', `${team}/surveys/{survey}/companions`, 'read', 'Companions of a survey', {
    answer: listOf('companions', companionSchema),
  }),
  route('get', `${team}/surveys/{survey}/maps`, 'read', 'The state of each target’s map', {
    answer: surveyMapsSchema,
  }),
  route('post', `${team}/surveys/{survey}/maps`, 'run', 'Compute the maps that are missing', {
    status: 202,
    answer: jobSchema,
  }),
  route('get', `${team}/targets/{target}`, 'read', 'One target', { answer: targetSchema }),
  route(
    'patch',
    `${team}/targets/{target}`,
    'write',
    'Leave a target out, or mark how it was chosen',
    {
      body: leaveOutSchema,
      answer: targetSchema,
    },
  ),
  route(
    'get',
    `${team}/maps/{map}`,
    'read',
    'A completeness map; as bytes: uint16, little-endian',
    {
      answer: mapViewSchema,
      files: bytes,
    },
  ),
  route('get', `${team}/uploads`, 'read', 'Uploads, newest first', {
    query: pageSchema.extend({ survey: z.string().optional() }),
    answer: listOf('uploads', uploadSchema),
  }),
  route('post', `${team}/uploads`, 'write', 'Send a file and read its report; stores no rows yet', {
    query: uploadQuerySchema,
    isUpload: true,
    status: 201,
    answer: uploadSchema,
  }),
  route(
    'post',
    `${team}/unfinished-files`,
    'write',
    'Begin a file that is sent in parts (tus 1.0)',
    {
      ...part,
      query: unfinishedQuerySchema,
      headers: { 'Upload-Length': { says: 'Bytes of the whole file', example: '52428800' } },
      status: 201,
      answer: unfinishedFileSchema,
    },
  ),
  route(
    'get',
    `${team}/unfinished-files/{unfinished}`,
    'write',
    'How much of a file has come: the header Upload-Offset',
  ),
  route('patch', `${team}/unfinished-files/{unfinished}`, 'write', 'Send the next part of a file', {
    ...part,
    headers: { 'Upload-Offset': { says: 'Bytes that have come before this part', example: '0' } },
  }),
  route('delete', `${team}/unfinished-files/{unfinished}`, 'write', 'Give a file in parts up'),
  route('get', `${team}/uploads/{upload}`, 'read', 'One upload and its report', {
    answer: uploadSchema,
  }),
  route('patch', `${team}/uploads/{upload}`, 'write', 'Change how the file is read', {
    body: uploadSettingsSchema,
    answer: uploadSchema,
  }),
  route('post', `${team}/uploads/{upload}/store`, 'write', 'Store what the file holds', {
    answer: uploadSchema,
  }),
  route('get', `${team}/uploads/{upload}/dependents`, 'read', 'What a stored file carries', {
    answer: dependentsSchema,
  }),
  route('post', `${team}/uploads/{upload}/withdraw`, 'write', 'Take a stored file back', {
    answer: uploadSchema,
  }),
  route(
    'get',
    `${team}/surveys/{survey}/column-mappings`,
    'read',
    'Remembered mappings of columns',
    {
      answer: listOf('mappings', columnMappingSchema),
    },
  ),
  route(
    'delete',
    `${team}/surveys/{survey}/column-mappings/{mapping}`,
    'write',
    'Forget a mapping of columns',
  ),
  route('get', `${team}/uploads/{upload}/file`, 'read', 'The original bytes', { files: bytes }),
  route('get', `${team}/cooling-tables`, 'read', 'Cooling tables', {
    answer: listOf('coolingTables', coolingTableSchema),
  }),
];
