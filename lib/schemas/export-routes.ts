import { type ApiRoute, route, team } from './api-route';
import { exportListSchema, exportQuerySchema, runExportQuerySchema } from './exports';

const tables = [
  'text/csv',
  'text/plain',
  'application/json',
  'application/x-votable+xml',
  'application/fits',
  'application/x-tex',
];
const arrays = [
  'application/zip',
  'application/octet-stream',
  'application/x-hdf5',
  'application/fits',
  'application/json',
];

const runFiles = [
  ...new Set([
    ...tables,
    ...arrays,
    'text/markdown',
    'application/x-bibtex',
    'image/svg+xml',
    'application/pdf',
  ]),
];

const pair = (address: string, whose: string, files: readonly string[]): ApiRoute[] => [
  route('get', address, 'read', `What ${whose} can be saved as`, { answer: exportListSchema }),
  route(
    'get',
    `${address}/{file}`,
    'read',
    `${whose[0].toUpperCase()}${whose.slice(1)} as a file`,
    {
      query: exportQuerySchema,
      files,
    },
  ),
];

export const exportRoutes: readonly ApiRoute[] = [
  route('get', `${team}/runs/{run}/exports`, 'read', 'What a finished run can be saved as', {
    answer: exportListSchema,
  }),
  route(
    'get',
    `${team}/runs/{run}/exports/{file}`,
    'read',
    'A run as table, maps, text or figure',
    {
      query: runExportQuerySchema,
      files: runFiles,
    },
  ),
  ...pair(`${team}/surveys/{survey}/exports`, 'a survey', [...new Set([...tables, ...arrays])]),
  ...pair(`${team}/samples/{sample}/exports`, 'a version of a sample', tables),
  ...pair(`${team}/stars/exports`, 'the list of stars', tables),
  ...pair(`${team}/populations/exports`, 'the list of populations', tables),
  ...pair(`${team}/maps/{map}/exports`, 'a completeness map', arrays),
];
