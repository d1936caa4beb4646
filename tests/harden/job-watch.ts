import { Client } from 'pg';

const EVERY_MS = 50;

interface Seen {
  id: string;
  status: string;
  attempts: number;
  /** Of the process that holds it, where one does. */
  pid: number | null;
}

const JOBS = `
  select j.id, j.status, j.attempts, split_part(h.process_id, ':', 2)::int as pid
    from job j left join worker_heartbeat h on h.worker_id = j.worker_id`;

/** Follows every job of a laboratory, and how long those of a killed worker wait. */
export class JobWatch {
  /** When each job's first attempt was killed. */
  readonly killed = new Map<string, number>();
  /** Seconds from the kill to the second attempt, one a job. */
  readonly secondAttempts: number[] = [];
  private jobs = new Map<string, Seen>();
  private readonly answered = new Set<string>();
  private readonly client: Client;
  private readonly connected: Promise<unknown>;
  private readonly timer: NodeJS.Timeout;
  private looking: Promise<void> = Promise.resolve();

  constructor(databaseUrl: string) {
    this.client = new Client({ connectionString: databaseUrl, application_name: 'harden' });
    this.connected = this.client.connect();
    this.timer = setInterval(() => {
      this.looking = this.looking.then(() => this.look());
    }, EVERY_MS);
  }

  async look(): Promise<void> {
    await this.connected;
    const { rows } = await this.client.query<Seen>(JOBS);
    this.jobs = new Map(rows.map((row) => [row.id, row]));
    for (const [id, killedAt] of this.killed) {
      const job = this.jobs.get(id);
      // It had ended before the kill came: nothing was hit.
      if (job?.status === 'done' && job.attempts === 1) this.killed.delete(id);
      if (this.answered.has(id) || (job?.attempts ?? 0) < 2) continue;
      this.answered.add(id);
      this.secondAttempts.push((Date.now() - killedAt) / 1000);
    }
  }

  isOpen(id: string): boolean {
    const status = this.jobs.get(id)?.status;
    return status === undefined || status === 'waiting' || status === 'running';
  }

  private heldBy(pid: number): Seen[] {
    return [...this.jobs.values()].filter((job) => job.status === 'running' && job.pid === pid);
  }

  /** Whether a process works on something, and on nothing that was tried before. */
  isFirstTry(pid: number): boolean {
    const held = this.heldBy(pid);
    return held.length > 0 && held.every((job) => job.attempts === 1 && !this.killed.has(job.id));
  }

  /** Notes that what a process held was cut off now. */
  noteKill(pid: number): void {
    const now = Date.now();
    for (const { id } of this.heldBy(pid)) this.killed.set(id, now);
  }

  async stop(): Promise<void> {
    clearInterval(this.timer);
    await this.looking.catch(() => {});
    await this.client.end();
  }
}
