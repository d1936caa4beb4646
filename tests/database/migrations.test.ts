import { Sequelize } from 'sequelize';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { migrations } from '@/lib/local/migrate';
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
