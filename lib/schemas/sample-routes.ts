import { type ApiRoute, listOf, route, team } from './api-route';
import {
  combinationPreviewSchema,
  combinationSchema,
  createCombinationSchema,
  previewCombinationSchema,
} from './combinations';
import { coolingRelationSchema, nameStartSchema } from './cooling';
import { mapStoreSchema } from './map-states';
import {
  createSampleSchema,
  previewSampleSchema,
  samplePreviewSchema,
  sampleSchema,
} from './samples';

/** Selections of stars, and how the maps of the store stand. */
export const sampleRoutes: readonly ApiRoute[] = [
  route('get', `${team}/samples`, 'read', 'Every version of every sample', {
    answer: listOf('samples', sampleSchema),
  }),
  route('post', `${team}/samples`, 'write', 'Save a sample, or a new version of one', {
    body: createSampleSchema,
    status: 201,
    answer: sampleSchema,
  }),
  route('post', `${team}/samples/preview`, 'read', 'What a selection of stars would hold', {
    body: previewSampleSchema,
    answer: samplePreviewSchema,
  }),
  route('get', `${team}/cooling-tables/{table}`, 'read', 'A cooling relation, or "built-in"', {
    answer: coolingRelationSchema,
  }),
  route(
    'patch',
    `${team}/cooling-tables/{table}`,
    'write',
    'Name what a cooling table starts from',
    {
      body: nameStartSchema,
      answer: coolingRelationSchema,
    },
  ),
  route('get', `${team}/maps`, 'read', 'How the maps of each survey stand, and why not current', {
    answer: mapStoreSchema,
  }),
  route('get', `${team}/combinations`, 'read', 'Every version of every combination', {
    answer: listOf('combinations', combinationSchema),
  }),
  route('post', `${team}/combinations`, 'write', 'Save several surveys as one, or a new version', {
    body: createCombinationSchema,
    status: 201,
    answer: combinationSchema,
  }),
  route('post', `${team}/combinations/preview`, 'read', 'What a combination would hold', {
    body: previewCombinationSchema,
    answer: combinationPreviewSchema,
  }),
];
