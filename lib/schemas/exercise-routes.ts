import { z } from 'zod';
import { type ApiRoute, listOf, route, team } from './api-route';
import {
  commentSubmissionSchema,
  createExerciseSchema,
  exerciseDetailSchema,
  exerciseSchema,
  submissionSchema,
  submitExerciseSchema,
  updateExerciseSchema,
} from './exercises';

const one = `${team}/exercises/{exercise}`;

/** Analyses set as tasks, and what was handed in. */
export const exerciseRoutes: readonly ApiRoute[] = [
  route('get', `${team}/exercises`, 'read', 'Exercises, newest first', {
    answer: listOf('exercises', exerciseSchema),
  }),
  route('post', `${team}/exercises`, 'write', 'Set an exercise', {
    body: createExerciseSchema,
    status: 201,
    answer: exerciseSchema,
  }),
  route('get', one, 'read', 'An exercise, with everybody’s submissions or your own', {
    answer: exerciseDetailSchema,
  }),
  route('patch', one, 'write', 'Change an exercise, or share it', {
    body: updateExerciseSchema,
    answer: exerciseSchema,
  }),
  route('post', `${one}/start`, 'write', 'Begin an exercise with a draft of your own', {
    status: 201,
    answer: z.object({ analysis: z.string() }),
  }),
  route('post', `${one}/submissions`, 'write', 'Hand in a run', {
    body: submitExerciseSchema,
    status: 201,
    answer: submissionSchema,
  }),
  route('get', `${one}/submissions/{submission}`, 'read', 'A submission', {
    answer: submissionSchema,
  }),
  route('patch', `${one}/submissions/{submission}`, 'write', 'Comment on a submission', {
    body: commentSubmissionSchema,
    answer: submissionSchema,
  }),
  route('get', `${one}/table`, 'read', 'Everybody’s submissions as a table', {
    files: ['text/csv'],
  }),
];
