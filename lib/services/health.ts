import { readdirSync } from 'node:fs';
import path from 'node:path';
import { QueryTypes } from 'sequelize';
import { database } from '@/models';

export interface Health {
  status: 'ok';
  /** Worker processes heard of in the last half minute. */
  workers: number;
}

/** One question to the database: an answer means that people can work. */
export async function readHealth(): Promise<Health> {
  const rows = await database().query<{ workers: number }>(
    `select count(*)::int as workers from worker_heartbeat
      where seen_at > now() - interval '30 seconds'`,
    { type: QueryTypes.SELECT },
  );
  return { status: 'ok', workers: rows[0].workers };
}

export interface Readiness {
  isReady: boolean;
  /** Migrations that the code has and the database has not. */
  missingMigrations: string[];
  /** Without one, pages work and jobs wait. */
  workers: number;
}

/** Whether this server may be sent people: its database answers and has the schema of its code. */
export async function readReadiness(): Promise<Readiness> {
  const { workers } = await readHealth();
  const rows = await database().query<{ name: string }>('select name from "SequelizeMeta"', {
    type: QueryTypes.SELECT,
  });
  const done = new Set(rows.map(({ name }) => name));
  const folder = path.join(/* turbopackIgnore: true */ process.cwd(), 'migrations');
  const missingMigrations = readdirSync(folder).filter(
    (name) => name.endsWith('.js') && !done.has(name),
  );
  return { isReady: missingMigrations.length === 0, missingMigrations, workers };
}
