'use client';

import { startTransition, useEffect, useMemo, useState } from 'react';
import type { LiveSample } from './live-sample';
import type { TaskAnswer, TaskArguments, TaskName } from './live-tasks';
import { type Asker, askThread, joinThread, leaveThread } from './live-thread-link';

export interface LiveTaskState<Answer> {
  /** Newest answer; the one before it stays until the next has come. */
  answer: Answer | undefined;
  /** Why there will be none. */
  fault?: string;
}

/**
 * The answer of a task that takes longer than a frame, for the newest arguments.
 *
 * @param sample sent to its thread once; undefined while it is not there yet
 * @param rest the task's arguments after the sample; asked anew when their JSON changes
 */
export function useLiveTask<Name extends TaskName>(
  sample: LiveSample | undefined,
  name: Name,
  ...rest: TaskArguments<Name>
): LiveTaskState<TaskAnswer<Name>> {
  const [state, setState] = useState<LiveTaskState<TaskAnswer<Name>>>({ answer: undefined });
  const [asker] = useState<Asker>(() => ({
    // What follows the hand goes first.
    onAnswer: (answer) => startTransition(() => setState({ answer: answer as TaskAnswer<Name> })),
    onFault: (fault) => setState(({ answer }) => ({ answer, fault })),
  }));
  const key = JSON.stringify(rest);
  const question = useMemo(() => JSON.parse(key) as unknown[], [key]);

  useEffect(() => {
    if (!sample) return;
    joinThread(sample, asker);
    return () => leaveThread(sample, asker);
  }, [sample, asker]);

  useEffect(() => {
    if (sample) askThread(sample, asker, name, question);
  }, [sample, asker, name, question]);

  return state;
}
