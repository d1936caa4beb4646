import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import path from 'node:path';
import { createInterface, type Interface } from 'node:readline';

/** The command of a Python that has NumPy, as the launcher of the benchmark found it. */
export function numpyCommand(): string | null {
  return process.env.BENCH_NUMPY || null;
}

export function monteCarloScript(): string {
  const folder = process.env.BENCH_FOLDER;
  if (!folder) throw new Error('BENCH_FOLDER is not set: "npm run bench" sets it');
  return path.join(folder, 'monte_carlo.py');
}

/** Runs a program to its end; what it writes on its standard error is shown. */
export async function runToEnd(command: string, words: string[]): Promise<string> {
  const child = spawn(command, words, { stdio: ['ignore', 'pipe', 'inherit'] });
  let output = '';
  child.stdout.setEncoding('utf8').on('data', (chunk) => {
    output += chunk;
  });
  const [code] = await once(child, 'close');
  if (code !== 0) throw new Error(`${command} ended with exit code ${code}`);
  return output;
}

/** A running Monte Carlo of one survey file, asked for some of its stars at a time. */
export class MonteCarloProcess {
  private readonly child: ChildProcess;
  private readonly lines: AsyncIterator<string>;
  private readonly reader: Interface;
  version = '';

  constructor(command: string, surveyFile: string) {
    const words = [monteCarloScript(), '--survey', surveyFile, '--serve'];
    this.child = spawn(command, words, { stdio: ['pipe', 'pipe', 'inherit'] });
    if (!this.child.stdout) throw new Error('the Monte Carlo has no output to read');
    this.reader = createInterface({ input: this.child.stdout });
    this.lines = this.reader[Symbol.asyncIterator]();
  }

  private async answer(): Promise<Record<string, unknown>> {
    const { value, done } = await this.lines.next();
    if (done) throw new Error('the Monte Carlo in NumPy ended before it answered');
    return JSON.parse(value);
  }

  async start(): Promise<void> {
    this.version = String((await this.answer()).numpy);
  }

  /** Processor time of the maps of some stars [ms]. */
  async measure(first: number, end: number): Promise<number> {
    this.child.stdin?.write(`${first} ${end}\n`);
    return Number((await this.answer()).ms);
  }

  async end(): Promise<void> {
    this.child.stdin?.end();
    if (this.child.exitCode === null) await once(this.child, 'exit');
    this.reader.close();
  }
}
