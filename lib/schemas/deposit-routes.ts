import { type ApiRoute, route, team } from './api-route';
import { depositSchema } from './deposits';

const deposit = `${team}/releases/{release}/deposit`;

/** Copies of releases in an open repository. */
export const depositRoutes: readonly ApiRoute[] = [
  route('get', deposit, 'read', 'The copy of a release in an open repository', {
    answer: depositSchema,
  }),
  route('post', deposit, 'write', 'Send a published release to an open repository', {
    status: 202,
    answer: depositSchema,
  }),
];
