import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Sequelize } from 'sequelize';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { migrate, migrations } from '@/lib/local/migrate';
import { withDatabase } from '../support/database';

const { url, query } = withDatabase();
let sequelize: Sequelize;

beforeAll(() => {
  sequelize = new Sequelize(url, { dialect: 'postgres', logging: false });
});
afterAll(() => sequelize.close());

/** Tables, columns, constraints, indexes, triggers and functions of the product's own schema. */
const describeSchema = () =>
  query(`
    select 'column' as kind, table_name || '.' || column_name as name,
           concat_ws(' ', data_type, is_nullable, column_default, is_identity) as definition
      from information_schema.columns where table_schema = 'public'
    union all select 'constraint', conrelid::regclass || '.' || conname, pg_get_constraintdef(oid)
      from pg_constraint where connamespace = 'public'::regnamespace
    union all select 'index', indexname, indexdef from pg_indexes where schemaname = 'public'
    union all select 'trigger', tgrelid::regclass || '.' || tgname, pg_get_triggerdef(oid)
      from pg_trigger where not tgisinternal and tgrelid::regclass::text not like 'queue.%'
    union all select 'function', proname, prosrc
      from pg_proc where pronamespace = 'public'::regnamespace
    order by kind, name, definition`);

it('all migrations go down to nothing and up to the same schema again', async () => {
  const before = await describeSchema();
  expect(before.length).toBeGreaterThan(200);
  await migrations(sequelize).down({ to: 0 });
  const left = (await describeSchema()).filter(({ name }) => !String(name).includes('Sequelize'));
  expect(left).toEqual([]);
  await migrations(sequelize).up();
  expect(await describeSchema()).toEqual(before);
});

it('a migration that fails half-way leaves the schema as it was, and the next try begins anew', async () => {
  const folder = mkdtempSync(path.join(tmpdir(), 'migrations-'));
  try {
    cpSync('migrations', folder, { recursive: true });
    const write = (name: string, rest: string) =>
      writeFileSync(
        path.join(folder, name),
        `exports.up = ({ context }) => context.sequelize.query(\`
           create table half_way (id integer); alter table survey add column half text; ${rest}\`);
         exports.down = ({ context }) => context.sequelize.query(
           'drop table half_way; alter table survey drop column half');`,
      );
    const before = await describeSchema();
    write('99990101000000-half-way.js', 'select 1 / 0;');
    await expect(migrate(url, folder)).rejects.toThrow('division by zero');
    expect(await describeSchema()).toEqual(before);
    // A file of another name, since the first one stays loaded.
    rmSync(path.join(folder, '99990101000000-half-way.js'));
    write('99990101000001-mended.js', '');
    expect(await migrate(url, folder)).toEqual(['99990101000001-mended.js']);
    await migrations(sequelize, folder).down();
    expect(await describeSchema()).toEqual(before);
  } finally {
    rmSync(folder, { recursive: true });
  }
});

it('each migration is one statement to the database, which takes it whole or not at all', () => {
  const files = readdirSync('migrations').filter((name) => name.endsWith('.js'));
  for (const name of files) {
    const calls = readFileSync(path.join('migrations', name), 'utf8').match(/\.query\(/g);
    expect(calls, name).toHaveLength(1);
  }
});

it('each migration alone goes down and up again', async () => {
  const before = await describeSchema();
  const umzug = migrations(sequelize);
  const done = await umzug.executed();
  for (let steps = 1; steps <= done.length; steps++) {
    await umzug.down({ step: steps });
    await umzug.up();
    expect(await describeSchema()).toEqual(before);
  }
});
