'use client';

import { useDeferredValue, useMemo } from 'react';
import { priorLaws } from '@/components/analyses/prior-choice';
import { type PopulationView, viewPopulation } from '@/lib/inference';
import { fromLogIndex, toLogIndex } from '@/lib/population';
import {
  type SwitchConsequences,
  spread,
  switchConsequences,
  type Trace,
  traceIndex,
  traceLevel,
} from './consequences';
import { type LiveAnswer, liveAnswer } from './live-answer';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';

/** An answer, or the sentence that says why there is none. */
export type LiveOutcome =
  | { view: PopulationView; live: LiveAnswer; fault?: undefined }
  | { view?: undefined; live?: undefined; fault: string };

/** The number, the curves and the table: they follow a control within the same frame. */
export function useLiveResult(
  sample: LiveSample | undefined,
  setting: LiveSetting,
): LiveOutcome | undefined {
  const view = useMemo(
    () => sample && attempt(() => viewPopulation(sample.maps, sample.grid, setting.definition)),
    [sample, setting.definition],
  );
  return useMemo(() => {
    if (!sample || !view) return undefined;
    if (view.fault !== undefined) return { fault: view.fault };
    const live = attempt(() => liveAnswer(sample, view.value, setting));
    return live.fault === undefined ? { view: view.value, live: live.value } : live;
  }, [sample, view, setting]);
}

export interface Consequences {
  massIndex: Trace;
  semiMajorAxisIndex: Trace;
  level: Trace;
  switches: SwitchConsequences;
}

/** Ends of the tracks, indices in the linear convention. */
export const TRACK = {
  massIndex: [-2.5, 0.5],
  semiMajorAxisIndex: [-1.8, 0.6],
  level: [0.5, 0.99],
} as const satisfies Record<string, readonly [number, number]>;

/** A track reaches to the value itself where that lies beyond its usual ends. */
export function trackOf(
  [from, to]: readonly [number, number],
  ...values: number[]
): [number, number] {
  return [Math.min(from, ...values), Math.max(to, ...values)];
}

/**
 * What every other position of every control would give.
 *
 * Follows with lower priority than the number itself: a drag is never held up by the tracks.
 */
export function useConsequences(
  sample: LiveSample | undefined,
  setting: LiveSetting,
  saved: LiveSetting,
): Consequences | undefined {
  const later = useDeferredValue(setting);
  const { definition } = later;
  const massTrack = useIndexTrace(sample, later, saved, 'massIndex');
  const axisTrack = useIndexTrace(sample, later, saved, 'semiMajorAxisIndex');
  const rest = useMemo(() => {
    if (!sample) return undefined;
    const view = attempt(() => viewPopulation(sample.maps, sample.grid, definition));
    if (view.fault !== undefined) return undefined;
    const [from, to] = trackOf(TRACK.level, later.credibleLevel, saved.credibleLevel);
    return {
      level: traceLevel(sample, view.value, later, spread([from, to], 48)),
      switches: switchConsequences(sample, view.value, later, [
        ...new Set([...priorLaws(later.likelihood), later.prior.law]),
      ]),
    };
  }, [sample, later, definition, saved.credibleLevel]);
  if (!massTrack || !axisTrack || !rest) return undefined;
  return { massIndex: massTrack, semiMajorAxisIndex: axisTrack, ...rest };
}

function useIndexTrace(
  sample: LiveSample | undefined,
  setting: LiveSetting,
  saved: LiveSetting,
  field: 'massIndex' | 'semiMajorAxisIndex',
): Trace | undefined {
  const linear = fromLogIndex(setting.definition[field], 'linear');
  const [from, to] = trackOf(TRACK[field], linear, fromLogIndex(saved.definition[field], 'linear'));
  // The moved index itself changes nothing about its own track.
  const still = JSON.stringify({ ...setting, definition: { ...setting.definition, [field]: 0 } });
  return useMemo(() => {
    if (!sample) return undefined;
    const fixed: LiveSetting = JSON.parse(still);
    const logIndices = spread([from, to]).map((index) => toLogIndex(index, 'linear'));
    const moving = field === 'massIndex' ? 'mass' : 'semiMajorAxis';
    const { limits } = traceIndex(sample, fixed, moving, logIndices);
    return { values: logIndices.map((index) => fromLogIndex(index, 'linear')), limits };
  }, [sample, still, from, to, field]);
}

function attempt<T>(
  ask: () => T,
): { value: T; fault?: undefined } | { value?: undefined; fault: string } {
  try {
    return { value: ask() };
  } catch (reason) {
    if (reason instanceof RangeError) return { fault: sentence(reason.message) };
    throw reason;
  }
}

function sentence(message: string): string {
  return `${message.charAt(0).toUpperCase()}${message.slice(1)}.`;
}
