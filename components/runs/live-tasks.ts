import { limitPlane } from '@/components/populations/limit-plane';
import { parameterTrace } from '@/components/populations/preview-figures';
import { consequencesInSteps, type Steps } from './consequences';
import type { LiveSample } from './live-sample';

/** What takes longer than a frame: done beside the page, in a thread of its own. */
export const liveTasks = {
  consequences: consequencesInSteps,
  limitPlane,
  parameterTrace,
};

export type LiveTasks = typeof liveTasks;
export type TaskName = keyof LiveTasks;

/** Arguments of a task after the sample, which the thread holds already. */
export type TaskArguments<Name extends TaskName> = LiveTasks[Name] extends (
  sample: LiveSample,
  ...rest: infer Rest
) => unknown
  ? Rest
  : never;
export type TaskAnswer<Name extends TaskName> =
  ReturnType<LiveTasks[Name]> extends Steps<infer Answer> ? Answer : ReturnType<LiveTasks[Name]>;

export type ToThread =
  | { kind: 'sample'; sample: LiveSample }
  | { kind: 'ask'; id: number; name: TaskName; rest: unknown[] };
export type FromThread =
  | { id: number; answer: unknown; fault?: undefined }
  | { id: number; fault: string };
