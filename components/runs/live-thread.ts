import type { LiveSample } from './live-sample';
import { type FromThread, liveTasks, type ToThread } from './live-tasks';

let sample: LiveSample | undefined;

/** The thread's side: it keeps the maps and answers one question after the other. */
self.onmessage = ({ data }: MessageEvent<ToThread>) => {
  if (data.kind === 'sample') {
    sample = data.sample;
    return;
  }
  self.postMessage(answer(data));
};

function answer({ id, name, rest }: Extract<ToThread, { kind: 'ask' }>): FromThread {
  try {
    if (sample === undefined) throw new Error('no maps have arrived');
    const task = liveTasks[name] as (sample: LiveSample, ...rest: unknown[]) => unknown;
    return { id, answer: task(sample, ...rest) };
  } catch (reason) {
    return { id, fault: reason instanceof Error ? reason.message : String(reason) };
  }
}
