'use client';

import { useEffect, useMemo, useRef } from 'react';
import { useLoaded } from '@/components/hooks/use-loaded';
import type { PopulationView } from '@/lib/inference';
import type { Steps } from './consequences';
import type { LiveAnswer } from './live-answer';
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
  const engine = useLoaded('live engine', () => import('./live-engine'));
  const views = useMemo(
    () => (sample && engine ? new engine.LiveViews(sample) : undefined),
    [sample, engine],
  );
  useRehearsal(engine, sample, setting);
  const view = useMemo(
    () =>
      views &&
      attempt(() =>
        views.of(setting.definition, { ageShift: setting.ageShift, cooling: setting.cooling }),
      ),
    [views, setting.definition, setting.ageShift, setting.cooling],
  );
  return useMemo(() => {
    if (!sample || !engine || !view) return undefined;
    if (view.fault !== undefined) return { fault: view.fault };
    const live = attempt(() => engine.liveAnswer(sample, view.value, setting));
    return live.fault === undefined ? { view: view.value, live: live.value } : live;
  }, [sample, engine, view, setting]);
}

/** Once a sample, one step whenever the browser has nothing else to do. */
function useRehearsal(
  engine: typeof import('./live-engine') | undefined,
  sample: LiveSample | undefined,
  setting: LiveSetting,
): void {
  const begun = useRef<{ of: LiveSample; steps: Steps<void> }>(undefined);
  useEffect(() => {
    if (!engine || !sample) return;
    if (begun.current?.of !== sample) {
      begun.current = { of: sample, steps: engine.rehearseDrag(sample, setting) };
    }
    const { steps } = begun.current;
    const later = window.requestIdleCallback ?? ((act: () => void) => window.setTimeout(act, 50));
    const cancel = window.cancelIdleCallback ?? window.clearTimeout;
    let next = later(function step() {
      if (!steps.next().done) next = later(step);
    });
    return () => cancel(next);
  }, [engine, sample, setting]);
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
