'use client';

import { useEffect, useMemo, useRef, useState } from 'react';
import type { LiveSample } from './live-sample';
import type { FromThread, TaskAnswer, TaskArguments, TaskName, ToThread } from './live-tasks';

/** A thread that holds one sample; a question asked while it works waits, and only the last one. */
class LiveThread {
  private readonly worker: Worker;
  private isBusy = false;
  private waiting: ToThread | undefined;
  private nextId = 0;
  onAnswer: (message: FromThread) => void = () => {};
  onFailure: (reason: string) => void = () => {};

  constructor(sample: LiveSample) {
    this.worker = new Worker(new URL('./live-thread.ts', import.meta.url), { type: 'module' });
    this.worker.onmessage = ({ data }: MessageEvent<FromThread>) => {
      this.isBusy = false;
      const next = this.waiting;
      this.waiting = undefined;
      if (next) this.send(next);
      this.onAnswer(data);
    };
    this.worker.onerror = (event) => this.onFailure(event.message || 'the thread did not start');
    this.worker.postMessage({ kind: 'sample', sample } satisfies ToThread);
  }

  ask(name: TaskName, rest: unknown[]): void {
    this.nextId += 1;
    const question: ToThread = { kind: 'ask', id: this.nextId, name, rest };
    if (this.isBusy) this.waiting = question;
    else this.send(question);
  }

  end(): void {
    this.worker.terminate();
  }

  private send(question: ToThread): void {
    this.isBusy = true;
    this.worker.postMessage(question);
  }
}

export interface LiveTaskState<Answer> {
  /** Newest answer; the one before it stays until the next has come. */
  answer: Answer | undefined;
  /** Why there will be none. */
  fault?: string;
}

/**
 * The answer of a task that takes longer than a frame, for the newest arguments.
 *
 * @param sample sent to the thread once; undefined while it is not there yet
 * @param rest the task's arguments after the sample; asked anew when their JSON changes
 */
export function useLiveTask<Name extends TaskName>(
  sample: LiveSample | undefined,
  name: Name,
  ...rest: TaskArguments<Name>
): LiveTaskState<TaskAnswer<Name>> {
  const thread = useRef<LiveThread>(undefined);
  const [state, setState] = useState<LiveTaskState<TaskAnswer<Name>>>({ answer: undefined });
  const key = JSON.stringify(rest);
  const question = useMemo(() => JSON.parse(key) as unknown[], [key]);

  useEffect(() => {
    if (!sample) return;
    const own = new LiveThread(sample);
    own.onAnswer = (message) =>
      setState((before) =>
        message.fault === undefined
          ? { answer: message.answer as TaskAnswer<Name> }
          : { answer: before.answer, fault: message.fault },
      );
    own.onFailure = (fault) => setState((before) => ({ answer: before.answer, fault }));
    thread.current = own;
    return () => {
      thread.current = undefined;
      own.end();
    };
  }, [sample]);

  useEffect(() => {
    if (sample) thread.current?.ask(name, question);
  }, [sample, name, question]);

  return state;
}
