'use client';

import { useMemo, useState } from 'react';
import useSWR from 'swr';
import type { DrawnRun } from '@/lib/schemas/runs';
import { COOLING_AS_RUN } from '@/lib/schemas/stack-choices';
import type { AgesCoolingAnswer, StudySummary } from '@/lib/schemas/studies';
import { apiPath, withQuery } from './api-path';
import { requestBytes } from './request';
import { readStarMaps } from './use-run-maps';
import { useRunStudies, useStudy } from './use-studies';

/** Maps of a run's stars under one age shift and one cooling model. */
export interface FetchedStack {
  cooling: string;
  age: number;
  /** Shape [star, mass, semi-major axis], completeness times 65535. */
  maps: Uint16Array;
}

export interface AgesCooling {
  /** The newest answer; null: none yet. */
  answer: AgesCoolingAnswer | null;
  /** The newest question, where it is on its way or ended without an answer. */
  open: StudySummary | undefined;
  stacks: FetchedStack[];
  /** Why stacks are missing. */
  error: unknown;
  /** Something that was asked for is still on its way. */
  isFetching: boolean;
  /** Whether all stacks were asked for; once they are there they stay. */
  wantsAll: boolean;
  /** Asks for all: a control has left the run's ages or cooling model. */
  wantAll(): void;
  /** Looks for a question that was asked just now. */
  refresh(): void;
}

const once = { revalidateIfStale: false, revalidateOnFocus: false, revalidateOnReconnect: false };

/**
 * What a run's answer about ages and cooling keeps: first the maps that show the consequences of each
 * control from where the run stands, and the others once a control has left there.
 *
 * @param known the answer that the page brings along
 * @param isReady whether the run's own maps are there, which come first
 */
export function useAgesCooling(
  collaboration: string,
  run: DrawnRun | undefined,
  known: AgesCoolingAnswer | null,
  isReady: boolean,
): AgesCooling {
  const { data: studies, mutate } = useRunStudies(collaboration, run?.id);
  const asked = studies?.filter(({ settings }) => settings.kind === 'ages-cooling');
  const done = asked?.find(({ job }) => job.status === 'done');
  const newest = asked?.[0];
  const isKnown = done === undefined || done.id === known?.id;
  const { data: study } = useStudy(collaboration, isKnown ? undefined : done.id);
  const answer = useMemo(() => {
    if (isKnown) return known;
    return study?.result?.kind === 'ages-cooling' ? { id: study.id, result: study.result } : null;
  }, [isKnown, known, study]);

  // Of one answer: a later run begins with the first stacks again.
  const [wantedAllOf, setWantedAllOf] = useState<string>();
  const wantsAll = answer !== null && wantedAllOf === answer.id;
  const isFirst = ({ cooling, age }: Wanted) => cooling === COOLING_AS_RUN || age === 0;
  const wanted = answer && isReady ? wantedOf(answer) : [];
  const first = useStacks(collaboration, run, answer?.id, wanted.filter(isFirst));
  const rest = useStacks(
    collaboration,
    run,
    answer?.id,
    wantsAll && first.data ? wanted.filter((one) => !isFirst(one)) : [],
  );
  const stacks = useMemo(
    () => [...(first.data ?? []), ...(rest.data ?? [])],
    [first.data, rest.data],
  );
  const open = newest && newest.job.status !== 'done' ? newest : undefined;
  const error = first.error ?? rest.error;
  const isFetching = !isReady || first.isLoading || rest.isLoading;
  return useMemo(
    () => ({
      ...{ answer, open, stacks, error, isFetching, wantsAll },
      wantAll: () => setWantedAllOf(answer?.id),
      refresh: () => {
        void mutate();
      },
    }),
    [answer, open, stacks, error, isFetching, wantsAll, mutate],
  );
}

type Wanted = Omit<FetchedStack, 'maps'>;

/** Every stack but the run's own maps. */
function wantedOf({ result }: AgesCoolingAnswer): Wanted[] {
  return result.models.flatMap(({ model, shifts }) =>
    shifts.flatMap(({ hasMaps }, i) => {
      const age = result.ageShifts[i];
      return hasMaps && !(model === COOLING_AS_RUN && age === 0) ? [{ cooling: model, age }] : [];
    }),
  );
}

function useStacks(
  collaboration: string,
  run: DrawnRun | undefined,
  studyId: string | undefined,
  wanted: Wanted[],
) {
  const inputs = run?.inputs;
  return useSWR<FetchedStack[]>(
    studyId === undefined || wanted.length === 0 || !inputs
      ? null
      : ['stacks', studyId, ...wanted.map(({ cooling, age }) => `${cooling} ${age}`)],
    async () => {
      if (!inputs || studyId === undefined) throw new Error('a run without inputs has no maps');
      const path = apiPath(collaboration, 'studies', studyId, 'maps');
      return Promise.all(
        wanted.map(async ({ cooling, age }) => {
          const bytes = await requestBytes(withQuery(path, { cooling, age: String(age) }));
          const { values } = readStarMaps(bytes, inputs.grid, inputs.stars.length);
          return { cooling, age, maps: values };
        }),
      );
    },
    once,
  );
}
