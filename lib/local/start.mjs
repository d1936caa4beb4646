import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { bundleScripts } from './bundle.mjs';
import { openCluster } from './cluster-files.mjs';
import { databaseAddress, ensureRoleAndDatabase } from './cluster-server.mjs';
import { dataFolder, folderDigest, root, runCommand } from './environment.mjs';
import { holdExclusively } from './exclusive.mjs';
import { ensurePackages } from './packages.mjs';
import { findFreePort, wantedPort } from './ports.mjs';
import { isAlive, waitUntil } from './process-run.mjs';
import {
  chooseMail,
  chooseOrcidStandIn,
  chooseRepositoryStandIn,
  readDemoSignIns,
  runScript,
  startProduct,
} from './product.mjs';
import { readSecrets } from './secrets.mjs';
import { killGroup } from './service-process.mjs';
import { databaseService } from './services.mjs';
import { stopOnSignals } from './stop-signals.mjs';
import { Supervisor } from './supervisor.mjs';
import { buildWeb, isBuildFresh } from './web-build.mjs';

const isDevelopment = process.argv.includes('--dev');
const isDemoWanted = process.env.RAREBOUND_DEMO !== 'no';
const folder = dataFolder();
const processesFile = path.join(folder, 'processes.json');
const say = (/** @type {string} */ line) => process.stdout.write(`${line}\n`);

/** Processes that outlived a killed launcher; where setpriv exists there are none. */
async function stopLeftovers() {
  let left = [];
  try {
    left = JSON.parse(readFileSync(processesFile, 'utf8'));
  } catch {
    return;
  }
  for (const { name, pid, startTicks } of left.reverse()) {
    if (name === 'postgres' || !isAlive(pid, startTicks)) continue;
    process.kill(pid, 'SIGTERM');
    if (!(await waitUntil(() => !isAlive(pid, startTicks), 12_000))) killGroup(pid);
  }
}

/** The database of the environment, or one on this machine under the supervisor's watch. */
async function startDatabase(supervisor) {
  const given = process.env.DATABASE_URL;
  if (given) return () => given;
  const cluster = await openCluster('postgres', { durable: true });
  await supervisor.start(databaseService(cluster));
  await ensureRoleAndDatabase(cluster, 'rarebound');
  return () => databaseAddress(cluster, 'rarebound');
}

async function bringUp(supervisor, state) {
  await ensurePackages();
  await stopLeftovers();
  const databaseUrl = await startDatabase(supervisor);
  const wanted = wantedPort(process.env.PORT);
  const port = await findFreePort(wanted);
  if (port !== wanted) say(`Port ${wanted} is in use; taking ${port}`);
  const product = {
    databaseUrl,
    folder,
    bundleFolder: 'dist',
    distFolder: '.next',
    port,
    address: process.env.NEXTAUTH_URL || `http://127.0.0.1:${port}`,
    mail: await chooseMail(port),
    orcidStandIn: await chooseOrcidStandIn(port, isDemoWanted),
    repositoryStandIn: await chooseRepositoryStandIn(port, isDemoWanted),
    secrets: readSecrets(folder),
    isDevelopment,
  };
  await bundleScripts(product.bundleFolder);
  await runScript(product, 'migrate');
  if (isDemoWanted) {
    const summary = await runScript(product, 'seed');
    if (summary !== '') say(summary);
  }
  if (!isDevelopment && !isBuildFresh(product.distFolder)) {
    say('Building the web part');
    await buildWeb(product.distFolder);
  }
  await startProduct(supervisor, product);
  Object.assign(state, { address: product.address, ...product.mail });
  return product;
}

function announce(product) {
  say('\nRarebound is running\n');
  say(`  Address  ${product.address}`);
  if (product.mail.mailboxUrl) say(`  Mailbox  ${product.mail.mailboxUrl}`);
  say(`  Logs     ${path.join(folder, 'logs').replace(`${root}/`, '')}`);
  const signIns = isDemoWanted ? readDemoSignIns(folder) : [];
  if (signIns.length > 0) say('\n  Demo sign-ins');
  const roleWidth = Math.max(0, ...signIns.map(({ role }) => role.length));
  const emailWidth = Math.max(0, ...signIns.map(({ email }) => email.length));
  for (const { role, email, password } of signIns) {
    say(`    ${role.padEnd(roleWidth)}  ${email.padEnd(emailWidth)}  ${password}`);
  }
  say('\nCtrl-C stops it.');
}

runCommand(async () => {
  const state = { address: null };
  const name = `start-${folderDigest(folder)}`;
  const lock = await holdExclusively(name, () => JSON.stringify(state));
  if ('heldBy' in lock) {
    const { address } = JSON.parse(lock.heldBy || '{}');
    say(
      address
        ? `Rarebound is already running: ${address}`
        : 'Rarebound is already being started here.',
    );
    return 0;
  }
  mkdirSync(path.join(folder, 'logs'), { recursive: true });
  const supervisor = new Supervisor({
    logsFolder: path.join(folder, 'logs'),
    say,
    onChange: (processes) => writeFileSync(processesFile, JSON.stringify(processes)),
  });
  const stopped = stopOnSignals(supervisor);
  try {
    // A signal in the middle of the preparations ends the step that runs; its complaint is no news.
    await Promise.race([bringUp(supervisor, state).then(announce), stopped]);
  } catch (error) {
    if (supervisor.isStopping) return stopped;
    await supervisor.stop();
    throw error;
  }
  return stopped;
});
