'use client';

import useSWR from 'swr';
import type { CoolingRelationView, StartCondition } from '@/lib/schemas/cooling';
import { answer } from './answer';
import { apiPath } from './api-path';
import { change } from './change';
import { request } from './request';

/** A cooling relation with its numbers. */
export function useCoolingRelation(collaboration: string, id: string | undefined) {
  return useSWR<CoolingRelationView>(
    id === undefined ? null : apiPath(collaboration, 'cooling-tables', id),
    (path: string) => request(path, answer('coolingRelationSchema')),
    { revalidateOnFocus: false, keepPreviousData: false },
  );
}

export function nameStart(
  collaboration: string,
  id: string,
  opened: StartCondition,
  startCondition: StartCondition,
): Promise<CoolingRelationView> {
  return change(apiPath(collaboration, 'cooling-tables', id), answer('coolingRelationSchema'), {
    part: (relation) => relation.startCondition,
    opened,
    body: { startCondition },
    answer: answer('coolingRelationSchema'),
  });
}
