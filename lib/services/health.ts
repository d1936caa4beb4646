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
