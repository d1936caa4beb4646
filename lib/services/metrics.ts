import { timingSafeEqual } from 'node:crypto';
import { collectDefaultMetrics, Gauge, Histogram, Registry } from 'prom-client';
import { QueryTypes } from 'sequelize';
import { config } from '@/lib/config';
import { NotFound, NotSignedIn } from '@/lib/errors';
import { database } from '@/models';

interface Metrics {
  registry: Registry;
  requests: Histogram<'method' | 'noun' | 'status'>;
}

interface JobCount {
  kind: string;
  status: string;
  count: number;
}

const ask = <Row extends object>(sql: string) =>
  database().query<Row>(sql, { type: QueryTypes.SELECT });

/** What the database knows is asked at each reading: several web servers then agree. */
function gaugesOfDatabase(registers: Registry[]): void {
  new Gauge({
    name: 'rarebound_jobs',
    help: 'Jobs by kind and state; ended ones of the last hour only',
    labelNames: ['kind', 'status'],
    registers,
    async collect() {
      const rows = await ask<JobCount>(
        `select kind, status, count(*)::int as count from job
          where finished_at is null or finished_at > now() - interval '1 hour' group by 1, 2`,
      );
      this.reset();
      for (const { kind, status, count } of rows) this.set({ kind, status }, count);
    },
  });
  new Gauge({
    name: 'rarebound_oldest_waiting_job_seconds',
    help: 'Age of the job that has waited longest, 0 when none waits',
    registers,
    async collect() {
      const [row] = await ask<{ age: number }>(
        `select coalesce(extract(epoch from now() - min(created_at)), 0)::float as age
           from job where status = 'waiting'`,
      );
      this.set(row.age);
    },
  });
  new Gauge({
    name: 'rarebound_worker_processes',
    help: 'Worker processes heard of in the last half minute',
    registers,
    async collect() {
      const [row] = await ask<{ count: number }>(
        `select count(distinct process_id)::int as count from worker_heartbeat
          where seen_at > now() - interval '30 seconds'`,
      );
      this.set(row.count);
    },
  });
  new Gauge({
    name: 'rarebound_database_bytes',
    help: 'Size of the database on disk',
    registers,
    async collect() {
      const [row] = await ask<{ size: number }>(
        'select pg_database_size(current_database())::float8 as size',
      );
      this.set(row.size);
    },
  });
}

function build(): Metrics {
  const registry = new Registry();
  collectDefaultMetrics({ register: registry });
  const requests = new Histogram({
    name: 'rarebound_request_seconds',
    help: 'Time to answer a request of the API',
    labelNames: ['method', 'noun', 'status'] as const,
    buckets: [0.005, 0.02, 0.05, 0.1, 0.25, 0.5, 1, 2.5, 10, 60],
    registers: [registry],
  });
  gaugesOfDatabase([registry]);
  return { registry, requests };
}

// One registry a process: the bundler may load this module more than once.
const shared = globalThis as typeof globalThis & { rareboundMetrics?: Metrics };
function metrics(): Metrics {
  shared.rareboundMetrics ??= build();
  return shared.rareboundMetrics;
}

/** The kind of thing that a path names, never an id: `runs` of /api/v1/collaborations/x/runs/y. */
function nounOf(pathname: string): string {
  const [, , , first = 'other', , noun] = pathname.split('/');
  return first === 'collaborations' && noun !== undefined ? noun : first;
}

/** Counts one answered request. */
export function observeRequest(
  request: Request,
  { status, seconds }: { status: number; seconds: number },
): void {
  const noun = nounOf(new URL(request.url).pathname);
  metrics().requests.observe({ method: request.method, noun, status: String(status) }, seconds);
}

/**
 * All metrics in the Prometheus text format.
 *
 * @throws NotFound unless a token for them is set
 * @throws NotSignedIn unless the request carries it
 */
export async function readMetrics(
  authorization: string | null,
): Promise<{ text: string; contentType: string }> {
  const { metricsToken } = config();
  if (!metricsToken) throw new NotFound('page');
  const wanted = Buffer.from(`Bearer ${metricsToken}`);
  const given = Buffer.from(authorization ?? '');
  if (given.length !== wanted.length || !timingSafeEqual(given, wanted)) throw new NotSignedIn();
  const { registry } = metrics();
  return { text: await registry.metrics(), contentType: registry.contentType };
}
