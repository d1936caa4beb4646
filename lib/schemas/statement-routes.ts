import { type ApiRoute, route, team } from './api-route';
import { limitStatementSchema, statementQuerySchema } from './statement';

/** A limit as a sentence with everything that it rests on. */
export const statementRoutes: readonly ApiRoute[] = [
  route(
    'get',
    `${team}/runs/{run}/statement`,
    'read',
    'A recorded limit as a statement, by Accept or ?as=: JSON, text or LaTeX',
    {
      query: statementQuerySchema,
      answer: limitStatementSchema,
      files: ['text/plain', 'application/x-latex'],
    },
  ),
];
