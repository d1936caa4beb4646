import { z } from 'zod';
import { type ApiRoute, route } from './api-route';

/** What helps somebody who begins: example files and the demonstration. */
export const exampleRoutes: readonly ApiRoute[] = [
  route('get', '/api/v1/examples/{kind}', 'open', 'A small file of invented data, of each kind', {
    files: ['text/csv'],
  }),
  route('post', '/api/v1/demonstration', 'session', 'Look around the demonstration as a student', {
    answer: z.object({ collaboration: z.string() }),
  }),
];
