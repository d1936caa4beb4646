import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { bundledFile } from './bundle';

export interface LogLine {
  level: string;
  event: string;
  [fact: string]: unknown;
}

export interface WorkerProcess {
  pid: number;
  lines: LogLine[];
  /** Everything that was no log line: empty unless something broke. */
  noise: string[];
  signal(name: NodeJS.Signals): void;
  /** Sends SIGTERM and waits; the exit code. */
  stop(): Promise<number | null>;
  /** kill -9, and waits until the process is gone. */
  kill(): Promise<void>;
}

const running = new Set<WorkerProcess>();

/** A real worker process on the database of this test file. */
export async function startWorker({ threads = 1 } = {}): Promise<WorkerProcess> {
  const child = spawn(process.execPath, ['--enable-source-maps', bundledFile('workers/main.ts')], {
    env: {
      ...process.env,
      NODE_ENV: 'test',
      RAREBOUND_WORKER_THREADS: String(threads),
      DATABASE_POOL: '4',
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const ended = once(child, 'exit');
  const worker: WorkerProcess = {
    pid: child.pid as number,
    lines: [],
    noise: [],
    signal: (name) => process.kill(worker.pid, name),
    async stop() {
      child.kill('SIGTERM');
      const [code] = await ended;
      running.delete(worker);
      return code;
    },
    async kill() {
      child.kill('SIGKILL');
      await ended;
      running.delete(worker);
    },
  };
  collect(child, worker);
  running.add(worker);
  await until('the worker is ready', () => hasLogged(worker, 'worker ready'));
  return worker;
}

/** For afterEach: a test that failed half-way leaves no process behind. */
export async function killWorkers(): Promise<void> {
  for (const worker of [...running]) await worker.kill();
}

export const hasLogged = (worker: WorkerProcess, event: string) =>
  worker.lines.some((line) => line.event === event);

function collect(child: ChildProcess, worker: WorkerProcess): void {
  for (const stream of [child.stdout, child.stderr]) {
    let rest = '';
    stream?.setEncoding('utf8').on('data', (text: string) => {
      const parts = (rest + text).split('\n');
      rest = parts.pop() ?? '';
      for (const part of parts) {
        if (part.startsWith('{')) worker.lines.push(JSON.parse(part) as LogLine);
        else if (part.trim() !== '') worker.noise.push(part);
      }
    });
  }
}

/** Waits until something holds; the limit is against hanging, no measure of speed. */
export async function until(
  what: string,
  holds: () => boolean | Promise<boolean>,
  limitS = 90,
): Promise<void> {
  const end = Date.now() + limitS * 1000;
  while (!(await holds())) {
    if (Date.now() > end) throw new Error(`waited ${limitS} s until ${what}`);
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
}
