import type { LiveSample } from './live-sample';
import type { FromThread, TaskName, ToThread } from './live-tasks';

export interface Asker {
  onAnswer(answer: unknown): void;
  onFault(reason: string): void;
}

/**
 * A thread that holds one sample and serves every asker of it.
 *
 * It works on one question at a time; of the questions that one asker sends meanwhile only the
 * last is kept, so a drag never builds up a queue.
 */
class LiveThreadLink {
  private readonly worker: Worker;
  private readonly waiting = new Map<Asker, ToThread>();
  private working: Asker | undefined;
  private readonly askers = new Set<Asker>();
  private nextId = 0;

  constructor(sample: LiveSample) {
    this.worker = new Worker(new URL('./live-thread.ts', import.meta.url), { type: 'module' });
    this.worker.onmessage = ({ data }: MessageEvent<FromThread>) => this.take(data);
    this.worker.onerror = (event) => {
      for (const asker of this.askers) asker.onFault(event.message || 'the thread did not start');
    };
    this.worker.postMessage({ kind: 'sample', sample } satisfies ToThread);
  }

  join(asker: Asker): void {
    this.askers.add(asker);
  }

  /** @returns true once nobody is left and the thread has ended */
  leave(asker: Asker): boolean {
    this.askers.delete(asker);
    this.waiting.delete(asker);
    if (this.askers.size > 0) return false;
    this.worker.terminate();
    return true;
  }

  ask(asker: Asker, name: TaskName, rest: unknown[]): void {
    this.nextId += 1;
    this.waiting.set(asker, { kind: 'ask', id: this.nextId, name, rest });
    this.sendNext();
  }

  private sendNext(): void {
    if (this.working) return;
    const next = this.waiting.entries().next().value;
    if (!next) return;
    const [asker, question] = next;
    this.waiting.delete(asker);
    this.working = asker;
    this.worker.postMessage(question);
  }

  private take(message: FromThread): void {
    const asker = this.working;
    this.working = undefined;
    this.sendNext();
    if (!asker || !this.askers.has(asker)) return;
    if (message.fault === undefined) asker.onAnswer(message.answer);
    else asker.onFault(message.fault);
  }
}

const links = new Map<LiveSample, LiveThreadLink>();

/** Joins the sample's thread, starting it for the first asker. */
export function joinThread(sample: LiveSample, asker: Asker): void {
  let link = links.get(sample);
  if (!link) {
    link = new LiveThreadLink(sample);
    links.set(sample, link);
  }
  link.join(asker);
}

export function leaveThread(sample: LiveSample, asker: Asker): void {
  if (links.get(sample)?.leave(asker)) links.delete(sample);
}

export function askThread(sample: LiveSample, asker: Asker, name: TaskName, rest: unknown[]): void {
  links.get(sample)?.ask(asker, name, rest);
}
