import { setTimeout as pause } from 'node:timers/promises';
import type { Api } from './api';

const MOST_SURVEYS = 100_000;
const START_S = 60;

interface Job {
  id: string;
  status: string;
}

interface Run {
  id: string;
  job: Job;
}

/** Calibrations that compute for longer than anybody measures; each has a stream of its own. */
export class LongJobs {
  readonly ids: string[] = [];

  constructor(private readonly api: Api) {}

  async start(count: number): Promise<void> {
    const { analyses } = await this.api.read<{ analyses: { runs: Run[] }[] }>('analyses');
    const ended = analyses.flatMap(({ runs }) => runs).filter(({ job }) => job.status === 'done');
    for (let i = 0; i < count; i++) {
      const seed = (Date.now() + i).toString(16);
      const asked = { kind: 'calibration', surveys: MOST_SURVEYS, seed };
      const { job } = await this.api.post<{ job: Job }>(`runs/${ended[0].id}/studies`, asked);
      this.ids.push(job.id);
    }
    for (let s = 0; s < START_S; s++) {
      if ((await this.computing()) === count) return;
      await pause(1000);
    }
    throw new Error(`${count} long jobs did not start within ${START_S} s`);
  }

  /** @returns how many of them compute at this moment */
  async computing(): Promise<number> {
    const jobs = await Promise.all(this.ids.map((id) => this.api.read<Job>(`jobs/${id}`)));
    return jobs.filter(({ status }) => status === 'running').length;
  }

  async stop(): Promise<void> {
    for (const id of this.ids) await this.api.post(`jobs/${id}/cancel`, {}).catch(() => null);
    while ((await this.computing()) > 0) await pause(500);
  }
}
