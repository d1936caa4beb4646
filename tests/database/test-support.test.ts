import { Client } from 'pg';
import { describe, expect, it } from 'vitest';
import { database } from '@/models';
import {
  createTestDatabase,
  dropTestDatabase,
  findOpenConnections,
  withDatabase,
} from '../support/database';

const mine = withDatabase();

describe('a test file', () => {
  it('has a database of its own that carries the schema', async () => {
    const rows = await mine.query<{ name: string }>('select current_database() as name');
    expect(rows).toEqual([{ name: mine.name }]);
    const tables = await mine.query<{ name: string }>(
      "select tablename as name from pg_tables where schemaname in ('public', 'queue')",
    );
    expect(tables.length).toBeGreaterThan(5);
  });

  it('reaches the same database through the models', async () => {
    expect(database().getDatabaseName()).toBe(mine.name);
  });

  it('works as a role that is no superuser', async () => {
    const rows = await mine.query<{ super: string }>(
      "select current_setting('is_superuser') as super",
    );
    expect(rows).toEqual([{ super: 'off' }]);
  });

  it('is told of a connection that was left open, and the database is dropped all the same', async () => {
    const other = await createTestDatabase();
    const client = new Client({ connectionString: other.url, application_name: 'forgetful' });
    client.on('error', () => undefined);
    await client.connect();
    await client.query('select 1 as forgotten');
    expect(await findOpenConnections(other, 0)).toEqual(['forgetful: select 1 as forgotten']);
    await expect(dropTestDatabase(other)).rejects.toThrow('1 connections were left open');
    const left = await mine.query('select 1 from pg_database where datname = $1', [other.name]);
    expect(left).toEqual([]);
  });
});
