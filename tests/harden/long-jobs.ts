import { setTimeout as pause } from 'node:timers/promises';
import type { Api } from './api';

const MOST_SURVEYS = 100_000;
const START_S = 60;
/** So many wait behind those that compute, since one may end while answers are timed. */
const SPARE = 6;

interface Job {
  id: string;
  status: string;
}

interface Run {
  id: string;
  job: Job;
}

const isOpen = ({ status }: Job) => status === 'waiting' || status === 'running';

/** Calibrations as large as they may be; each has a stream of its own. */
export class LongJobs {
  ids: string[] = [];
  private runId: string | undefined;
  private seed = Date.now();

  constructor(private readonly api: Api) {}

  /** Sees to it that so many at least compute, and that others follow them. */
  async keep(count: number): Promise<void> {
    this.ids = (await this.read()).filter(isOpen).map(({ id }) => id);
    while (this.ids.length < count + SPARE) this.ids.push(await this.ask());
    for (let s = 0; s < START_S; s++) {
      if ((await this.computing()) >= count) return;
      await pause(1000);
    }
    throw new Error(`${count} long jobs did not start within ${START_S} s`);
  }

  /** @returns how many of them compute at this moment */
  async computing(): Promise<number> {
    return (await this.read()).filter(({ status }) => status === 'running').length;
  }

  async stop(): Promise<void> {
    for (const id of [...this.ids].reverse())
      await this.api.post(`jobs/${id}/cancel`, {}).catch(() => null);
    while ((await this.read()).some(isOpen)) await pause(500);
  }

  private read(): Promise<Job[]> {
    return Promise.all(this.ids.map((id) => this.api.read<Job>(`jobs/${id}`)));
  }

  private async ask(): Promise<string> {
    this.runId ??= await this.findRun();
    const seed = (this.seed++).toString(16);
    const asked = { kind: 'calibration', surveys: MOST_SURVEYS, seed };
    const { job } = await this.api.post<{ job: Job }>(`runs/${this.runId}/studies`, asked);
    return job.id;
  }

  private async findRun(): Promise<string> {
    const { analyses } = await this.api.read<{ analyses: { runs: Run[] }[] }>('analyses');
    const done = analyses.flatMap(({ runs }) => runs).find(({ job }) => job.status === 'done');
    if (!done) throw new Error('no run has ended yet');
    return done.id;
  }
}
