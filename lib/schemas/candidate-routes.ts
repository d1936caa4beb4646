import { type ApiRoute, route, team } from './api-route';
import {
  addObservationSchema,
  candidateDetailSchema,
  candidateListSchema,
  candidateQuerySchema,
  giveVerdictSchema,
} from './candidates';

const oneCandidate = `${team}/candidates/{candidate}`;
/** Candidates, their epochs and what is decided of them. */
export const candidateRoutes: ApiRoute[] = [
  route('get', `${team}/candidates`, 'read', 'Candidates of all surveys, open ones first', {
    query: candidateQuerySchema,
    answer: candidateListSchema,
  }),
  route('get', oneCandidate, 'read', 'A candidate: epochs, hypotheses, estimates and history', {
    answer: candidateDetailSchema,
  }),
  route('post', `${oneCandidate}/observations`, 'write', 'Add an epoch of a candidate', {
    body: addObservationSchema,
    status: 201,
    answer: candidateDetailSchema,
  }),
  route('delete', `${oneCandidate}/observations/{observation}`, 'write', 'Delete an epoch'),
  route('post', `${oneCandidate}/verdicts`, 'write', 'Decide about a candidate, or propose to', {
    body: giveVerdictSchema,
    status: 201,
    answer: candidateDetailSchema,
  }),
];
