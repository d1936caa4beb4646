import { type ApiRoute, route, team } from './api-route';
import {
  offerSurveySchema,
  refuseShareSchema,
  shareSchema,
  sharesSchema,
  withdrawShareSchema,
} from './sharing';

const one = `${team}/shares/{share}`;

export const sharingRoutes: ApiRoute[] = [
  route('get', `${team}/shares`, 'read', 'Surveys offered to others and by others', {
    answer: sharesSchema,
  }),
  route(
    'post',
    `${team}/surveys/{survey}/shares`,
    'write',
    'Offer a survey to another collaboration',
    { body: offerSurveySchema, status: 201, answer: shareSchema },
  ),
  route('post', `${one}/accept`, 'write', 'Accept an offered survey: a read-only copy', {
    answer: shareSchema,
  }),
  route('post', `${one}/refuse`, 'write', 'Refuse an offered survey', {
    body: refuseShareSchema,
    answer: shareSchema,
  }),
  route('post', `${one}/refresh`, 'write', 'Bring the copy to the owner’s newest version', {
    answer: shareSchema,
  }),
  route('post', `${one}/withdraw`, 'write', 'Take back an offer or a shared survey', {
    body: withdrawShareSchema,
    answer: shareSchema,
  }),
];
