'use client';

import useSWR from 'swr';
import type {
  CreateExercise,
  ExerciseDetail,
  ExerciseView,
  UpdateExercise,
} from '@/lib/schemas/exercises';
import { answer } from './answer';
import { apiPath } from './api-path';
import { change, pick } from './change';
import { request } from './request';

export function useExercises(collaboration: string, fallback?: ExerciseView[]) {
  return useSWR(
    apiPath(collaboration, 'exercises'),
    async (path) => (await request(path, answer('exercisesAnswerSchema'))).exercises,
    { fallbackData: fallback },
  );
}

export function useExercise(collaboration: string, fallback: ExerciseDetail) {
  return useSWR(
    apiPath(collaboration, 'exercises', fallback.key),
    (path) => request(path, answer('exerciseDetailSchema')),
    { fallbackData: fallback },
  );
}

export function createExercise(collaboration: string, body: CreateExercise): Promise<ExerciseView> {
  return request(apiPath(collaboration, 'exercises'), answer('exerciseSchema'), {
    method: 'POST',
    body,
  });
}

/** Changes those parts of an exercise that were opened. */
export function updateExercise<Name extends keyof ExerciseView & keyof UpdateExercise>(
  collaboration: string,
  key: string,
  opened: Pick<ExerciseView, Name>,
  body: Pick<UpdateExercise, Name>,
): Promise<ExerciseView> {
  return change(apiPath(collaboration, 'exercises', key), answer('exerciseDetailSchema'), {
    part: (exercise) => pick<ExerciseView, Name>(exercise, opened),
    opened,
    body,
    answer: answer('exerciseSchema'),
  });
}

export function beginExercise(collaboration: string, key: string): Promise<{ analysis: string }> {
  return request(
    apiPath(collaboration, 'exercises', key, 'start'),
    answer('analysisAnswerSchema'),
    { method: 'POST', body: {} },
  );
}

export function handIn(collaboration: string, key: string, runId: string, remark: string) {
  return request(
    apiPath(collaboration, 'exercises', key, 'submissions'),
    answer('submissionSchema'),
    {
      method: 'POST',
      body: { runId, remark },
    },
  );
}

export function commentOn(
  collaboration: string,
  key: string,
  submissionId: string,
  opened: string,
  comment: string,
) {
  return change(
    apiPath(collaboration, 'exercises', key, 'submissions', submissionId),
    answer('submissionSchema'),
    {
      part: (submission) => submission.comment ?? '',
      opened,
      body: { comment },
      answer: answer('submissionSchema'),
    },
  );
}

/** Address of everybody's submissions as a table; the browser itself follows it. */
export function exerciseTableAddress(collaboration: string, key: string): string {
  return apiPath(collaboration, 'exercises', key, 'table');
}
