import { type ApiRoute, route, team } from './api-route';
import { searchAnswerSchema, searchQuerySchema } from './search';

export const searchRoutes: ApiRoute[] = [
  route('get', `${team}/search`, 'read', 'Find by name or number, closest first', {
    query: searchQuerySchema,
    answer: searchAnswerSchema,
  }),
];
