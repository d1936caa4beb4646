import { type ApiRoute, route, team } from './api-route';
import {
  adoptionPreviewSchema,
  adoptManySchema,
  adoptSchema,
  decideManySchema,
  decisionSchema,
  overlapsSchema,
  previewAdoptionSchema,
  proposedSchema,
  splitSchema,
  starListSchema,
  starPageSchema,
  starQuerySchema,
  valueTablesSchema,
} from './stars';

const pair = `${team}/stars/overlaps/{pair}`;

export const starRoutes: ApiRoute[] = [
  route('get', `${team}/stars`, 'read', 'Stars, each once, with what every survey says of it', {
    query: starQuerySchema,
    answer: starListSchema,
  }),
  route('get', `${team}/stars/{star}`, 'read', 'One star with curves, companions and analyses', {
    answer: starPageSchema,
  }),
  route(
    'post',
    `${team}/stars/{star}/adopt`,
    'write',
    'Adopt an age or a distance, in a new table',
    {
      body: adoptSchema,
      answer: starPageSchema,
    },
  ),
  route('post', `${team}/stars/{star}/split`, 'write', 'Part an entry from its star', {
    body: splitSchema,
    answer: starPageSchema,
  }),
  route('get', `${team}/stars/overlaps`, 'read', 'Pairs that may be one star, surest first', {
    answer: overlapsSchema,
  }),
  route('post', `${team}/stars/overlaps`, 'write', 'Look again for pairs that may be one star', {
    answer: proposedSchema,
  }),
  route(
    'post',
    `${team}/stars/overlaps/confirm`,
    'write',
    'Take the two of each pair for one star: of all pairs or of none',
    { body: decideManySchema, answer: overlapsSchema },
  ),
  route('post', `${pair}/confirm`, 'write', 'Take the two for one star', {
    body: decisionSchema,
    answer: overlapsSchema,
  }),
  route('post', `${pair}/refuse`, 'write', 'Keep the two apart', {
    body: decisionSchema,
    answer: overlapsSchema,
  }),
  route('post', `${pair}/undo`, 'write', 'Take a decision back', {
    body: decisionSchema,
    answer: overlapsSchema,
  }),
  route('get', `${team}/value-tables`, 'read', 'Tables of adopted ages and distances', {
    answer: valueTablesSchema,
  }),
  route(
    'post',
    `${team}/value-tables`,
    'write',
    'Adopt ages or distances of several stars, in one new table',
    { body: adoptManySchema, status: 201, answer: valueTablesSchema },
  ),
  route(
    'post',
    `${team}/value-tables/preview`,
    'read',
    'How adopted values would move the limit of the lead analysis',
    { body: previewAdoptionSchema, answer: adoptionPreviewSchema },
  ),
];
