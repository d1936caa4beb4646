import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { bundleScripts } from './bundle.mjs';
import { openCluster } from './cluster-files.mjs';
import { databaseAddress, findServer } from './cluster-server.mjs';
import { dataFolder, folderDigest, LauncherProblem, root, runCommand } from './environment.mjs';
import { askHolder } from './exclusive.mjs';
import { ensurePackages } from './packages.mjs';
import { productEnvironment } from './product.mjs';
import { readSecrets } from './secrets.mjs';
import { workerService } from './services.mjs';
import { stopOnSignals } from './stop-signals.mjs';
import { Supervisor } from './supervisor.mjs';

const folder = dataFolder();
const bundleFolder = 'dist';

/** The database of the environment, else the one that `npm start` runs in this folder. */
async function findDatabase() {
  const given = process.env.DATABASE_URL;
  if (given) return () => given;
  const connectionFile = path.join(folder, 'postgres', 'connection.json');
  if (existsSync(connectionFile)) {
    const cluster = await openCluster('postgres', { durable: true });
    // Read again at each restart: a restarted database may have had to take another port.
    const address = () =>
      databaseAddress(
        { ...cluster, connection: JSON.parse(readFileSync(connectionFile, 'utf8')) },
        'rarebound',
      );
    if (findServer(cluster) !== null) return address;
  }
  throw new LauncherProblem(
    'No database to work for: set DATABASE_URL, or run "npm start" in this folder first.',
  );
}

runCommand(async () => {
  await ensurePackages();
  const databaseUrl = await findDatabase();
  const running = await askHolder(`start-${folderDigest(folder)}`);
  // The bundle of a running product stays as it is: its threads load files from it later.
  const isBundled = existsSync(path.join(root, bundleFolder, 'workers/main.js'));
  if (running === null || !isBundled) await bundleScripts(bundleFolder);
  const product = JSON.parse(running || '{}');
  const environment = () =>
    productEnvironment({
      databaseUrl,
      folder,
      address: product.address ?? process.env.NEXTAUTH_URL ?? 'http://127.0.0.1:3210',
      mail: {
        mailUrl: product.mailUrl ?? process.env.MAIL_URL,
        mailboxUrl: product.mailboxUrl ?? process.env.MAILBOX_URL,
      },
      secrets: readSecrets(folder),
      isDevelopment: false,
    });
  const logName = `worker-${process.pid}`;
  const supervisor = new Supervisor({
    logsFolder: path.join(folder, 'logs'),
    say: (line) => process.stdout.write(`${line}\n`),
  });
  const stopped = stopOnSignals(supervisor);
  await supervisor.start({ ...workerService({ bundleFolder, environment }), name: logName });
  process.stdout.write(
    `One more worker is running; its log is ${path.join(folder, 'logs', `${logName}.log`)}\nCtrl-C stops it.\n`,
  );
  return stopped;
});
