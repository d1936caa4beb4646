import type { LiveSample } from './live-sample';
import type { FromThread, TaskName, ToThread } from './live-tasks';

export interface Asker {
  onAnswer(answer: unknown): void;
  onFault(reason: string): void;
}

/**
 * A thread that holds one sample, with what has come to it, and serves every asker of it.
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
  private held: LiveSample | undefined;

  constructor() {
    this.worker = new Worker(new URL('./live-thread.ts', import.meta.url), { type: 'module' });
    this.worker.onmessage = ({ data }: MessageEvent<FromThread>) => this.take(data);
    this.worker.onerror = (event) => {
      for (const asker of this.askers) asker.onFault(event.message || 'the thread did not start');
    };
  }

  /** From the next question on the thread answers from this one. */
  hold(sample: LiveSample): void {
    if (this.held === sample) return;
    this.held = sample;
    this.worker.postMessage({ kind: 'sample', sample } satisfies ToThread);
  }

  join(asker: Asker): void {
    this.askers.add(asker);
  }

  leave(asker: Asker): void {
    this.askers.delete(asker);
    this.waiting.delete(asker);
  }

  get isAlone(): boolean {
    return this.askers.size === 0;
  }

  end(): void {
    this.worker.terminate();
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

/** By the sample's own maps: what comes to a sample later is sent to the thread that it has. */
const links = new Map<Uint16Array, LiveThreadLink>();

/** Joins the sample's thread, starting it for the first asker. */
export function joinThread(sample: LiveSample, asker: Asker): void {
  const link = links.get(sample.maps) ?? new LiveThreadLink();
  links.set(sample.maps, link);
  link.hold(sample);
  link.join(asker);
}

/** A thread ends once nobody has come back to it. */
export function leaveThread(sample: LiveSample, asker: Asker): void {
  const link = links.get(sample.maps);
  link?.leave(asker);
  setTimeout(() => {
    if (!link?.isAlone || links.get(sample.maps) !== link) return;
    links.delete(sample.maps);
    link.end();
  });
}

export function askThread(sample: LiveSample, asker: Asker, name: TaskName, rest: unknown[]): void {
  links.get(sample.maps)?.ask(asker, name, rest);
}
