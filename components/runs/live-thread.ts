import type { Steps } from './consequences';
import type { LiveSample } from './live-sample';
import { type FromThread, liveTasks, type ToThread } from './live-tasks';

/** Works a quarter of the time, so that a machine of two cores keeps one and a half for the page. */
const WORK_MS = 3;
const REST_MS = 9;

let sample: LiveSample | undefined;

/** The thread's side: it keeps the maps and answers one question after the other. */
self.onmessage = async ({ data }: MessageEvent<ToThread>) => {
  if (data.kind === 'sample') {
    sample = data.sample;
    return;
  }
  self.postMessage(await answer(data));
};

async function answer({ id, name, rest }: Extract<ToThread, { kind: 'ask' }>): Promise<FromThread> {
  try {
    if (sample === undefined) throw new Error('no maps have arrived');
    const task = liveTasks[name] as (sample: LiveSample, ...rest: unknown[]) => unknown;
    const given = task(sample, ...rest);
    return { id, answer: isSteps(given) ? await takeTurns(given) : given };
  } catch (reason) {
    return { id, fault: reason instanceof Error ? reason.message : String(reason) };
  }
}

const isSteps = (given: unknown): given is Steps<unknown> =>
  typeof given === 'object' && given !== null && Symbol.iterator in given && 'next' in given;

async function takeTurns(steps: Steps<unknown>): Promise<unknown> {
  for (;;) {
    const end = performance.now() + WORK_MS;
    while (performance.now() < end) {
      const { done, value } = steps.next();
      if (done) return value;
    }
    await new Promise((resolve) => setTimeout(resolve, REST_MS));
  }
}
