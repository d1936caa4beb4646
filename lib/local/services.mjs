import path from 'node:path';
import {
  findServer,
  isServerReady,
  prepareServer,
  serverArguments,
  stopServer,
} from './cluster-server.mjs';
import { root } from './environment.mjs';
import { nextEnvironment, nextProgram } from './web-build.mjs';

/** @typedef {import('./service-process.mjs').Service} Service */

async function answers(/** @type {string} */ address) {
  try {
    return (await fetch(address, { signal: AbortSignal.timeout(5000) })).status === 200;
  } catch {
    return false;
  }
}

/**
 * The database server. A server that an earlier launcher left is stopped first, so that this one
 * is ours to watch; after a kill -9 its backends may hold the memory for a while, hence the tries.
 *
 * @param {import('./cluster-files.mjs').Cluster} cluster
 * @returns {Service}
 */
export function databaseService(cluster) {
  return {
    name: 'postgres',
    command: path.join(cluster.binaries, 'postgres'),
    get args() {
      return serverArguments(cluster);
    },
    cwd: '/',
    owner: cluster.owner,
    prepare: async () => {
      if (findServer(cluster) !== null) await stopServer(cluster);
      await prepareServer(cluster);
    },
    isReady: () => isServerReady(cluster),
    readyMs: 60_000,
    tries: 20,
    stopSignal: 'INT',
    stopMs: 15_000,
  };
}

/** @returns {Service} */
export function mailboxService({ bundleFolder, environment }) {
  return {
    name: 'mailbox',
    command: process.execPath,
    args: ['--enable-source-maps', path.join(root, bundleFolder, 'lib/local/mailbox.js')],
    cwd: root,
    env: environment,
    isReady: () => answers(environment().MAILBOX_URL),
    stopMs: 3000,
  };
}

/** The stand-in for ORCID; it believes everybody, so only the demonstration has one. @returns {Service} */
export function orcidService({ bundleFolder, environment }) {
  return {
    name: 'orcid',
    command: process.execPath,
    args: ['--enable-source-maps', path.join(root, bundleFolder, 'lib/local/orcid-stand-in.js')],
    cwd: root,
    env: environment,
    isReady: () => answers(environment().ORCID_ISSUER),
    stopMs: 3000,
  };
}

/** @returns {Service} */
export function repositoryService({ bundleFolder, environment }) {
  return {
    name: 'repository',
    command: process.execPath,
    args: [
      '--enable-source-maps',
      path.join(root, bundleFolder, 'lib/local/repository-stand-in.js'),
    ],
    cwd: root,
    env: environment,
    isReady: () => answers(`${environment().REPOSITORY_URL}/health`),
    stopMs: 3000,
  };
}

/** @returns {Service} */
export function workerService({ bundleFolder, environment }) {
  return {
    name: 'worker',
    command: process.execPath,
    args: ['--enable-source-maps', path.join(root, bundleFolder, 'workers/main.js')],
    cwd: root,
    env: environment,
    // It listens to nothing: what survives its first second has read its settings and connected.
    isReady: (upMs) => upMs > 1000,
  };
}

/**
 * Room for the web server's heap [MB], some eight times what it holds at once. With all the room that
 * a large machine offers, the collector lets garbage pile up to twice the memory, for a twelfth more
 * pages a second.
 */
const WEB_HEAP_MB = 1024;

/** @returns {Service} */
export function webService({ distFolder, environment, port, isDevelopment }) {
  const words = isDevelopment ? ['dev'] : ['start'];
  // In a container the proxy comes from outside; anywhere else nobody but this machine may ask.
  const host = process.env.RAREBOUND_HOST || '127.0.0.1';
  return {
    name: 'web',
    command: process.execPath,
    args: [
      `--max-old-space-size=${WEB_HEAP_MB}`,
      nextProgram,
      ...words,
      '-H',
      host,
      '-p',
      String(port),
    ],
    cwd: root,
    env: () => ({ ...environment(), ...nextEnvironment(distFolder) }),
    isReady: () => answers(`http://127.0.0.1:${port}/api/health`),
    readyMs: 90_000,
  };
}
