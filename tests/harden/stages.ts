import { performance } from 'node:perf_hooks';
import { watchMemory } from './memory';
import type { Bench, RunningProduct } from './row';

/** Seconds of each stage, and the most resident memory of web and worker during it [MB]. */
export class Stages {
  readonly seconds: Record<string, number> = {};
  readonly webMb: Record<string, number> = {};
  readonly workerMb: Record<string, number> = {};

  constructor(
    private readonly product: RunningProduct,
    private readonly say: Bench['say'],
  ) {}

  async time<Answer>(name: string, work: () => Promise<Answer>): Promise<Answer> {
    const web = watchMemory(this.product.pidOf('web'));
    const worker = watchMemory(this.product.pidOf('worker'));
    const start = performance.now();
    try {
      return await work();
    } finally {
      const seconds = Number(((performance.now() - start) / 1000).toFixed(2));
      this.seconds[name] = seconds;
      this.webMb[name] = web.stop();
      this.workerMb[name] = worker.stop();
      this.say(
        `${name}: ${seconds} s, web ${this.webMb[name]} MB, worker ${this.workerMb[name]} MB`,
      );
    }
  }

  /** Seconds of the stages whose names begin so. */
  sum(...beginnings: string[]): number {
    const total = Object.entries(this.seconds)
      .filter(([name]) => beginnings.some((beginning) => name.startsWith(beginning)))
      .reduce((sum, [, value]) => sum + value, 0);
    return Number(total.toFixed(1));
  }

  get peak(): { webMb: number; workerMb: number } {
    return {
      webMb: Math.max(...Object.values(this.webMb)),
      workerMb: Math.max(...Object.values(this.workerMb)),
    };
  }

  get details() {
    return { seconds: this.seconds, webMb: this.webMb, workerMb: this.workerMb };
  }
}
