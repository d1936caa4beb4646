import path from 'node:path';
import { ensureBinaries, openCluster } from './cluster-files.mjs';
import {
  databaseAddress,
  ensureRoleAndDatabase,
  findServer,
  startServer,
  stopServer,
} from './cluster-server.mjs';
import { dataFolder } from './environment.mjs';

/**
 * The database of the environment, or the one that `npm start` keeps in this folder, with the
 * programs that copy it. A server that was not running is started for the while.
 *
 * @returns {Promise<{ databaseUrl: string, binaries: string, close: () => Promise<void> }>}
 */
export async function databaseTools() {
  const given = process.env.DATABASE_URL;
  if (given) {
    return { databaseUrl: given, binaries: await ensureBinaries(), close: async () => {} };
  }
  const cluster = await openCluster('postgres', { durable: true });
  const { binaries } = cluster;
  const wasRunning = findServer(cluster) !== null;
  if (!wasRunning) {
    const logFile = path.join(dataFolder(), 'postgres', 'server.log');
    await startServer(cluster, { logFile, outlivesThisProcess: false });
  }
  await ensureRoleAndDatabase(cluster, 'rarebound');
  return {
    databaseUrl: databaseAddress(cluster, 'rarebound'),
    binaries,
    close: async () => {
      if (!wasRunning) await stopServer(cluster);
    },
  };
}
