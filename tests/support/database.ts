import { randomBytes } from 'node:crypto';
import { Client, Pool, type QueryResultRow } from 'pg';
import { closeDatabase } from '@/models';

const TEMPLATE = 'rarebound_template';
const TEMPLATE_IN_USE = '55006';
const VACUUM_IS_NOT_OURS = '42501';

export interface TestDatabase {
  name: string;
  url: string;
}

function maintenanceUrl(): string {
  const url = process.env.TEST_DATABASE_URL;
  if (!url) throw new Error('TEST_DATABASE_URL is not set: tests/support/test-cluster.ts sets it');
  return url;
}

async function withClient<T>(url: string, work: (client: Client) => Promise<T>): Promise<T> {
  const client = new Client({ connectionString: url, application_name: 'test-support' });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/** Connections of this file's own statements: a new one for each takes longer than most of them. */
let statements: Pool | undefined;

function statementsOn(url: string): Pool {
  statements ??= new Pool({ connectionString: url, application_name: 'test-support' })
    // A test may end every connection to its database.
    .on('error', () => undefined);
  return statements;
}

/** Ends the connections of `query`; the next statement opens a new one. */
async function endStatements(): Promise<void> {
  await statements?.end();
  statements = undefined;
}

/** A migrated, empty database of its own, copied from the template. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const name = `test_${process.pid}_${randomBytes(4).toString('hex')}`;
  const url = new URL(maintenanceUrl());
  url.pathname = `/${name}`;
  await withClient(maintenanceUrl(), async (client) => {
    const end = Date.now() + 30_000;
    for (;;) {
      try {
        await client.query(`create database ${name} template ${TEMPLATE} strategy file_copy`);
        return;
      } catch (error) {
        // The template can be copied by one test file at a time.
        const isBusy = (error as { code?: string }).code === TEMPLATE_IN_USE;
        if (!isBusy || Date.now() > end) throw error;
        await new Promise((resolve) => setTimeout(resolve, 50 + Math.random() * 100));
      }
    }
  });
  return { name, url: url.href };
}

/**
 * Connections that others hold to a database, as "application: last statement".
 *
 * @param patienceMs how long a connection that is just being closed may take
 */
export async function findOpenConnections(
  database: TestDatabase,
  patienceMs = 2000,
): Promise<string[]> {
  return withClient(maintenanceUrl(), async (client) => {
    const end = Date.now() + patienceMs;
    for (;;) {
      const { rows } = await client.query<{ application: string; statement: string }>(
        `select application_name as application, left(query, 120) as statement
           from pg_stat_activity where datname = $1 and backend_type = 'client backend'`,
        [database.name],
      );
      if (rows.length === 0 || Date.now() > end) {
        return rows.map((row) => `${row.application || 'unnamed'}: ${row.statement}`);
      }
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
  });
}

/** Drops the database; throws when a pool, a listener or a worker still holds a connection to it. */
export async function dropTestDatabase(database: TestDatabase): Promise<void> {
  await closeDatabase();
  await endStatements();
  const open = await findOpenConnections(database);
  await withClient(maintenanceUrl(), async (client) => {
    const end = Date.now() + 20_000;
    for (;;) {
      try {
        await client.query(`drop database if exists ${database.name} with (force)`);
        return;
      } catch (error) {
        // The server's own vacuum is at work there, and is not ours to end: it soon leaves.
        const isVacuumed = (error as { code?: string }).code === VACUUM_IS_NOT_OURS;
        if (!isVacuumed || Date.now() > end) throw error;
        await new Promise((resolve) => setTimeout(resolve, 250));
      }
    }
  });
  if (open.length > 0) {
    throw new Error(`${open.length} connections were left open\n  ${open.join('\n  ')}`);
  }
}

/**
 * The database of this test file: made before the file is imported, dropped after its last hook.
 * DATABASE_URL holds its address already, so `database()` of models reaches it too.
 */
export function withDatabase() {
  const url = process.env.DATABASE_URL ?? '';
  const name = new URL(url).pathname.slice(1);
  if (!name.startsWith('test_')) throw new Error(`${name} is not the database of a test file`);
  return {
    name,
    url,
    /** Rows of one statement, past every model and their connections. */
    query: async <Row extends QueryResultRow>(
      sql: string,
      values: unknown[] = [],
    ): Promise<Row[]> => (await statementsOn(url).query<Row>(sql, values)).rows,
    /** Ends every connection of this file to it, where a test wants the database to itself. */
    async leave(): Promise<void> {
      await closeDatabase();
      await endStatements();
    },
  };
}
