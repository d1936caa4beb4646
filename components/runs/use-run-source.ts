'use client';

import { useMemo } from 'react';
import { type AgesCooling, useAgesCooling } from '@/components/hooks/use-ages-cooling';
import { useRunMaps } from '@/components/hooks/use-run-maps';
import type { DrawnRun } from '@/lib/schemas/runs';
import type { AgesCoolingAnswer } from '@/lib/schemas/studies';
import { furtherOf, type LiveSample, sampleOf } from './live-sample';

/** Where live controls take their numbers from: the maps of a run, and what came to them. */
export interface RunSource {
  /** Undefined until the run's own maps are there. */
  sample: LiveSample | undefined;
  /** Why they are not. */
  error: unknown;
  fetchAgain(): void;
  agesCooling: AgesCooling;
}

/**
 * Asked for above the setting: a hand on a control moves nothing here, so nothing of it is looked up
 * anew with each frame.
 *
 * @param run undefined while there is none: then nothing is asked for
 * @param known the answer about ages and cooling that the page brought along
 */
export function useRunSource(
  collaboration: string,
  run: DrawnRun | undefined,
  known: AgesCoolingAnswer | null,
): RunSource {
  const { data: maps, error, mutate } = useRunMaps(collaboration, run);
  const agesCooling = useAgesCooling(collaboration, run, known, maps !== undefined);
  const { answer, stacks } = agesCooling;
  const inputs = run?.inputs;
  const sample = useMemo(() => {
    const further = maps && answer && furtherOf(answer, maps, stacks);
    return maps && inputs ? sampleOf(inputs, maps, further ?? undefined) : undefined;
  }, [inputs, maps, answer, stacks]);
  return useMemo(
    () => ({
      ...{ sample, error, agesCooling },
      fetchAgain: () => {
        void mutate();
      },
    }),
    [sample, error, agesCooling, mutate],
  );
}
