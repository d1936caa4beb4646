import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { newestBinaries } from '@/lib/local/cluster-files.mjs';
import { backUp, manifestOf, restore } from '@/lib/local/database-copy.mjs';
import { databaseTools } from '@/lib/local/database-tools.mjs';
import { withDatabase } from '../support/database';
import { createCollaborationWith } from '../support/people';
import { buildSurvey, buildTarget } from '../support/sample';

const { url, name, query, leave } = withDatabase();
const folder = mkdtempSync(path.join(os.tmpdir(), 'backup-'));
const file = path.join(folder, 'laboratory.dump');
const tools = { databaseUrl: url, binaries: newestBinaries() ?? '' };

beforeAll(async () => {
  const { collaboration, people } = await createCollaborationWith(['owner', 'collaborator']);
  const survey = await buildSurvey(collaboration.id, { leadId: people.collaborator.id });
  for (let i = 1; i <= 5; i++) await buildTarget(survey, { name: `Star ${i}`, distancePc: 20 + i });
});
afterAll(async () => {
  rmSync(folder, { recursive: true });
  await query(`select pg_terminate_backend(pid) from pg_stat_activity where datname = $1`, [
    `${name}_replaced`,
  ]);
  const { Client } = await import('pg');
  const address = new URL(url);
  address.pathname = '/postgres';
  const client = new Client({ connectionString: address.href });
  await client.connect();
  await client.query(`drop database if exists "${name}_replaced"`);
  await client.end();
});

const targets = () =>
  query<{ name: string; distance_pc: number }>('select * from target order by name');

it('a restored laboratory has the rows and digests of its backup, whatever happened since', async () => {
  const before = await targets();
  const made = await backUp({ ...tools, file });
  expect(made.tables['public.target'].rows).toBe(5);
  await query(`delete from target where name = 'Star 2'`);
  await query(`update target set name = 'Another' where name = 'Star 3'`);
  await leave();

  const { replaced } = await restore({ ...tools, file });
  expect(replaced).toBe(`${name}_replaced`);
  expect(await targets()).toEqual(before);
  const again = await backUp({ ...tools, file: path.join(folder, 'again.dump') });
  expect(again.tables).toEqual(made.tables);
});

it('the digests see one changed value', async () => {
  const { tables } = JSON.parse(readFileSync(manifestOf(file), 'utf8'));
  await query(`update target set distance_pc = distance_pc * (1 + 1e-15) where name = 'Star 1'`);
  const { tables: changed } = await backUp({ ...tools, file: path.join(folder, 'changed.dump') });
  expect(changed['public.target'].rows).toBe(tables['public.target'].rows);
  expect(changed['public.target'].digest).not.toBe(tables['public.target'].digest);
});

it.each([
  ['a flipped byte', (bytes: Buffer) => bytes.fill(bytes[500] ^ 1, 500, 501)],
  ['a cut end', (bytes: Buffer) => bytes.subarray(0, bytes.length - 100)],
])('a backup with %s is refused before anything is dropped', async (_, damage) => {
  const bytes = readFileSync(file);
  const damaged = path.join(folder, 'damaged.dump');
  writeFileSync(damaged, damage(bytes));
  writeFileSync(manifestOf(damaged), readFileSync(manifestOf(file)));
  const before = await targets();
  await expect(restore({ ...tools, file: damaged })).rejects.toThrow(/damaged.*SHA-256/);
  expect(await targets()).toEqual(before);
});

it('a database of the environment is copied without one being made on this machine', async () => {
  const data = path.join(folder, 'data');
  vi.stubEnv('RAREBOUND_DATA_DIR', data);
  vi.stubEnv('DATABASE_URL', url);
  expect(await databaseTools()).toMatchObject(tools);
  expect(existsSync(path.join(data, 'postgres'))).toBe(false);
});
