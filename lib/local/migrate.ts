import path from 'node:path';
import { runMigrations } from 'graphile-worker';
import { Client } from 'pg';
import { Sequelize } from 'sequelize';
import { SequelizeStorage, Umzug } from 'umzug';

/** Any number will do, as long as everybody who migrates takes the same. */
const MIGRATION_LOCK = 72_616_265;

/** Brings product and queue schemas up to date; several machines may call it at once. */
export async function migrate(databaseUrl: string, folder = 'migrations'): Promise<string[]> {
  const lock = new Client({ connectionString: databaseUrl });
  await lock.connect();
  const sequelize = new Sequelize(databaseUrl, { dialect: 'postgres', logging: false });
  try {
    await lock.query('select pg_advisory_lock($1)', [MIGRATION_LOCK]);
    const umzug = migrations(sequelize, folder);
    const done = await umzug.up();
    await runMigrations({ connectionString: databaseUrl, schema: 'queue' });
    return done.map((migration) => migration.name);
  } finally {
    await sequelize.close();
    await lock.end();
  }
}

/** The product's migrations, for `up` and for tests that go down and up again. */
export function migrations(sequelize: Sequelize, folder = 'migrations') {
  return new Umzug({
    migrations: { glob: ['*.js', { cwd: path.resolve(folder) }] },
    context: sequelize.getQueryInterface(),
    storage: new SequelizeStorage({ sequelize }),
    logger: undefined,
  });
}

async function main(): Promise<void> {
  const url = process.env.DATABASE_URL;
  if (!url) throw new Error('DATABASE_URL is not set');
  const done = await migrate(url);
  process.stdout.write(
    done.length === 0 ? 'schema is up to date\n' : `migrated ${done.join(', ')}\n`,
  );
}

if (process.argv[1] && /migrate\.js$/.test(process.argv[1])) {
  main().catch((error: unknown) => {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
  });
}
