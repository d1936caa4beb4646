import { randomBytes } from 'node:crypto';
import {
  chownSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import path from 'node:path';
import { installDebianPackage } from './debian.mjs';
import { dataFolder, folderDigest, LauncherProblem } from './environment.mjs';
import { findAnyPort } from './ports.mjs';
import { run } from './process-run.mjs';

const versionsFolder = '/usr/lib/postgresql';

/**
 * A PostgreSQL cluster of the project's own.
 *
 * @typedef {object} Cluster
 * @property {string} name of its folder below the data folder
 * @property {boolean} durable false for tests only: no fsync
 * @property {string} data where the server keeps its files
 * @property {string} binaries folder of the server's programs
 * @property {{ uid?: number, gid?: number }} owner who runs it; the server refuses to run as root
 * @property {string} connectionFile
 * @property {Record<string, string>} [more] settings of the server beside the usual ones
 * @property {{ id: string, port: number, password: string, superuserPassword: string }} connection
 */

/** @returns {string | null} the folder of the newest PostgreSQL programs on this machine */
export function newestBinaries() {
  if (!existsSync(versionsFolder)) return null;
  const versions = readdirSync(versionsFolder)
    .filter((name) => existsSync(path.join(versionsFolder, name, 'bin/initdb')))
    .sort((a, b) => Number(b) - Number(a));
  return versions.length === 0 ? null : path.join(versionsFolder, versions[0], 'bin');
}

/**
 * The newest PostgreSQL programs, installed where there are none.
 *
 * @returns {Promise<string>} their folder
 */
export async function ensureBinaries() {
  if (newestBinaries() === null) await installDebianPackage('postgresql', 'to keep the data');
  const binaries = newestBinaries();
  if (binaries === null) throw new LauncherProblem(`No PostgreSQL server in ${versionsFolder}.`);
  return binaries;
}

/** The programs of the version that made the files, else the newest. */
async function findBinaries(/** @type {string} */ data) {
  const versionFile = path.join(data, 'PG_VERSION');
  if (existsSync(versionFile)) {
    const version = readFileSync(versionFile, 'utf8').trim();
    const binaries = path.join(versionsFolder, version, 'bin');
    if (existsSync(path.join(binaries, 'postgres'))) return binaries;
    throw new LauncherProblem(
      `The database in ${data} was made by PostgreSQL ${version}, which is not installed.`,
    );
  }
  return ensureBinaries();
}

/** Root may not run the server: Debian's postgres account does. */
function findOwner() {
  if (process.getuid?.() !== 0) return {};
  const line = readFileSync('/etc/passwd', 'utf8').match(/^postgres:[^:]*:(\d+):(\d+):/m);
  if (line === null)
    throw new LauncherProblem('There is no account "postgres" to run the database.');
  return { uid: Number(line[1]), gid: Number(line[2]) };
}

function readConnection(/** @type {string} */ file) {
  return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : null;
}

export function saveConnection(/** @type {Cluster} */ { connectionFile, connection }) {
  writeFileSync(`${connectionFile}.new`, `${JSON.stringify(connection)}\n`, { mode: 0o600 });
  renameSync(`${connectionFile}.new`, connectionFile);
}

/** Below a folder that the server's account cannot walk to, such as /root, the files go elsewhere. */
async function choosePlace(home, owner, id) {
  if (owner.uid === undefined) return home;
  const reachable = await run('/usr/bin/test', ['-x', home], { ...owner, cwd: '/' });
  if (reachable.code === 0) return home;
  return path.join('/var/lib/rarebound', `${folderDigest(home)}-${id}`);
}

/**
 * Finds the cluster of this name, making its files when there are none.
 *
 * @param {string} name
 * @param {{ durable: boolean }} options
 * @returns {Promise<Cluster>}
 */
export async function openCluster(name, { durable }) {
  const home = path.join(dataFolder(), name);
  mkdirSync(home, { recursive: true });
  await ensureBinaries();
  const owner = findOwner();
  const connectionFile = path.join(home, 'connection.json');
  const known = readConnection(connectionFile);
  const secret = () => randomBytes(24).toString('base64url');
  const connection = known ?? {
    id: randomBytes(4).toString('hex'),
    port: await findAnyPort(),
    password: secret(),
    superuserPassword: secret(),
  };
  const place = await choosePlace(home, owner, connection.id);
  const data = path.join(place, 'data');
  if (known === null && existsSync(data)) {
    throw new LauncherProblem(
      `${connectionFile}, which holds the password of the database, is missing. Put it back, or move ${data} away to start with an empty database.`,
    );
  }
  const cluster = { name, durable, data, owner, connectionFile, connection };
  if (known === null) saveConnection({ ...cluster, binaries: '' });
  const opened = { ...cluster, binaries: await findBinaries(data) };
  if (!existsSync(data)) await makeFiles(opened, place);
  return opened;
}

/** Makes the files under another name first: a half-made cluster never counts. */
async function makeFiles({ data, owner, binaries, connection }, place) {
  mkdirSync(place, { recursive: true });
  for (const name of readdirSync(place).filter((entry) => entry.startsWith('unfinished-'))) {
    rmSync(path.join(place, name), { recursive: true, force: true });
  }
  const unfinished = path.join(place, `unfinished-${process.pid}`);
  const passwordFile = path.join(place, `unfinished-password-${process.pid}`);
  mkdirSync(unfinished, { mode: 0o700 });
  writeFileSync(passwordFile, `${connection.superuserPassword}\n`, { mode: 0o600 });
  if (owner.uid !== undefined) {
    chownSync(unfinished, owner.uid, owner.gid);
    chownSync(passwordFile, owner.uid, owner.gid);
  }
  const { code, output } = await run(
    path.join(binaries, 'initdb'),
    [
      '-D',
      unfinished,
      '-U',
      'postgres',
      '-E',
      'UTF8',
      '--locale=C.UTF-8',
      '-k',
      '--auth=scram-sha-256',
      `--pwfile=${passwordFile}`,
    ],
    { ...owner, cwd: '/' },
  );
  rmSync(passwordFile);
  if (code !== 0) throw new LauncherProblem(`The database could not be made:\n${output.trim()}`);
  renameSync(unfinished, data);
}
