import { createHash } from 'node:crypto';
import {
  createReadStream,
  existsSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import path from 'node:path';
import pg from 'pg';
import { LauncherProblem } from './environment.mjs';
import { run } from './process-run.mjs';

/**
 * What a backup holds, kept beside its file: enough to refuse a damaged one before anything is
 * touched, and to prove that what came back is what went in.
 *
 * @typedef {object} Manifest
 * @property {string} madeAt
 * @property {string} sha256 of the file
 * @property {Record<string, { rows: number, digest: string }>} tables by schema and name
 */

export const manifestOf = (/** @type {string} */ file) => `${file}.json`;

async function withClient(databaseUrl, work) {
  const client = new pg.Client({ connectionString: databaseUrl, application_name: 'backup' });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/** Rows of every table and a digest of what they hold, whatever their order on disk. */
async function describeTables(client) {
  const { rows } = await client.query(
    `select format('%I.%I', schemaname, tablename) as name from pg_tables
      where schemaname not in ('pg_catalog', 'information_schema') order by 1`,
  );
  const tables = {};
  for (const { name } of rows) {
    const counted = await client.query(
      `select count(*)::int as rows,
              coalesce(sum(hashtextextended(t::text, 0)::numeric), 0)::text as digest from ${name} t`,
    );
    tables[name] = counted.rows[0];
  }
  return tables;
}

function sha256Of(/** @type {string} */ file) {
  return new Promise((resolve, reject) => {
    const hash = createHash('sha256');
    createReadStream(file)
      .on('error', reject)
      .on('data', (chunk) => hash.update(chunk))
      .on('end', () => resolve(hash.digest('hex')));
  });
}

/** The password travels in the environment, never in arguments that every account can read. */
function connectionArguments(/** @type {string} */ databaseUrl) {
  const { hostname, port, username, password, pathname } = new URL(databaseUrl);
  const args = ['-h', hostname, '-p', port || '5432', '-U', decodeURIComponent(username)];
  const env = { ...process.env, PGPASSWORD: decodeURIComponent(password) };
  return { args, env, database: decodeURIComponent(pathname.slice(1)) };
}

async function runProgram(binaries, name, databaseUrl, words) {
  const { args, env } = connectionArguments(databaseUrl);
  const { code, output } = await run(path.join(binaries, name), [...args, ...words], { env });
  if (code !== 0) throw new LauncherProblem(`${name} stopped:\n${output.trim()}`);
}

/**
 * Writes the whole database into a file while the product may go on: dump and digests see the same
 * moment.
 *
 * @param {{ databaseUrl: string, binaries: string, file: string }} options
 * @returns {Promise<Manifest>}
 */
export async function backUp({ databaseUrl, binaries, file }) {
  const unfinished = `${file}.unfinished`;
  const { database } = connectionArguments(databaseUrl);
  const tables = await withClient(databaseUrl, async (client) => {
    await client.query('begin isolation level repeatable read read only');
    const { rows } = await client.query('select pg_export_snapshot() as snapshot');
    const [described] = await Promise.all([
      describeTables(client),
      runProgram(binaries, 'pg_dump', databaseUrl, [
        '--format=custom',
        '--no-owner',
        `--snapshot=${rows[0].snapshot}`,
        `--file=${unfinished}`,
        database,
      ]),
    ]);
    await client.query('rollback');
    return described;
  });
  const manifest = { madeAt: new Date().toISOString(), sha256: await sha256Of(unfinished), tables };
  writeFileSync(manifestOf(file), `${JSON.stringify(manifest, null, 1)}\n`, { mode: 0o600 });
  renameSync(unfinished, file);
  return manifest;
}

/** @returns {Promise<Manifest>} of a backup whose bytes are as they were written */
async function readManifest(/** @type {string} */ file) {
  for (const needed of [file, manifestOf(file)]) {
    if (!existsSync(needed)) throw new LauncherProblem(`There is no file ${needed}.`);
  }
  let manifest;
  try {
    manifest = JSON.parse(readFileSync(manifestOf(file), 'utf8'));
  } catch {
    throw new LauncherProblem(`${manifestOf(file)} is damaged; nothing was changed.`);
  }
  const found = await sha256Of(file);
  if (found !== manifest.sha256) {
    throw new LauncherProblem(
      `${file} is damaged: its SHA-256 is ${found}, expected ${manifest.sha256}. Nothing was changed.`,
    );
  }
  return manifest;
}

function differences(/** @type {Manifest} */ { tables }, found) {
  const names = new Set([...Object.keys(tables), ...Object.keys(found)]);
  return [...names].filter(
    (name) =>
      tables[name]?.rows !== found[name]?.rows || tables[name]?.digest !== found[name]?.digest,
  );
}

const quoted = (/** @type {string} */ name) => `"${name.replaceAll('"', '""')}"`;

/**
 * Puts a backup in the place of a database. It is restored under another name and compared with its
 * digests first; only then do the names change, and what stood there is kept as `…_replaced`.
 *
 * @param {{ databaseUrl: string, binaries: string, file: string }} options
 * @returns {Promise<{ manifest: Manifest, replaced: string | null }>}
 */
export async function restore({ databaseUrl, binaries, file }) {
  const manifest = await readManifest(file);
  const { database } = connectionArguments(databaseUrl);
  const incoming = `${database}_restoring`;
  const replaced = `${database}_replaced`;
  const addressOf = (name) => {
    const address = new URL(databaseUrl);
    address.pathname = `/${encodeURIComponent(name)}`;
    return address.href;
  };
  const maintain = (work) => withClient(addressOf('postgres'), work);

  await maintain(async (client) => {
    await client.query(`drop database if exists ${quoted(incoming)}`);
    await client.query(`create database ${quoted(incoming)} template template0`);
  });
  try {
    await runProgram(binaries, 'pg_restore', databaseUrl, [
      '--exit-on-error',
      '--no-owner',
      `--dbname=${incoming}`,
      file,
    ]);
    const found = await withClient(addressOf(incoming), describeTables);
    const wrong = differences(manifest, found);
    if (wrong.length > 0) {
      throw new LauncherProblem(
        `What came back differs from the backup in ${wrong.join(', ')}. Nothing was changed.`,
      );
    }
  } catch (error) {
    await maintain((client) => client.query(`drop database if exists ${quoted(incoming)}`));
    throw error;
  }
  return maintain(async (client) => {
    const { rowCount } = await client.query('select from pg_database where datname = $1', [
      database,
    ]);
    if (rowCount > 0) {
      await client.query(`drop database if exists ${quoted(replaced)}`);
      await client.query(`alter database ${quoted(database)} rename to ${quoted(replaced)}`);
    }
    await client.query(`alter database ${quoted(incoming)} rename to ${quoted(database)}`);
    return { manifest, replaced: rowCount > 0 ? replaced : null };
  });
}

/** Removes a backup and what belongs to it. */
export function removeBackup(/** @type {string} */ file) {
  for (const name of [file, manifestOf(file), `${file}.unfinished`]) rmSync(name, { force: true });
}
