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

export function updateExercise(collaboration: string, key: string, body: UpdateExercise) {
  return request(apiPath(collaboration, 'exercises', key), answer('exerciseSchema'), {
    method: 'PATCH',
    body,
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
  comment: string,
) {
  const path = apiPath(collaboration, 'exercises', key, 'submissions', submissionId);
  return request(path, answer('submissionSchema'), { method: 'PATCH', body: { comment } });
}

/** Address of everybody's submissions as a table; the browser itself follows it. */
export function exerciseTableAddress(collaboration: string, key: string): string {
  return apiPath(collaboration, 'exercises', key, 'table');
}
