import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { LauncherProblem } from './environment.mjs';
import { run } from './process-run.mjs';

const clusterSettings = '/etc/postgresql-common/createcluster.d/rarebound.conf';

/** The words before a command that root must run, or null when this person may not. */
async function rootPrefix() {
  if (process.getuid?.() === 0) return [];
  return (await run('sudo', ['-n', 'true'])).code === 0 ? ['sudo', '-n'] : null;
}

/**
 * Installs a Debian package when this person may; otherwise says what to type.
 *
 * @param {string} name of the package
 * @param {string} purpose what it is needed for, as the end of a sentence
 */
export async function installDebianPackage(name, purpose) {
  const advice = `Install it with "apt-get install ${name}" as root and start again.`;
  const prefix = await rootPrefix();
  if (!existsSync('/usr/bin/apt-get') || prefix === null) {
    throw new LauncherProblem(
      `The Debian package ${name} is missing; it is needed ${purpose}. ${advice}`,
    );
  }
  process.stdout.write(`Installing the Debian package ${name}, needed ${purpose}\n`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const asRoot = (/** @type {string[]} */ ...words) => {
    const [command, ...args] = [...prefix, 'env', 'DEBIAN_FRONTEND=noninteractive', ...words];
    return run(command, args, { env, cwd: '/' });
  };
  if (name === 'postgresql') await forbidDebiansOwnCluster(prefix, asRoot);
  const update = await asRoot('apt-get', 'update');
  const install = await asRoot('apt-get', 'install', '-y', '--no-install-recommends', name);
  if (install.code !== 0) {
    const words = `${update.code === 0 ? '' : update.output}${install.output}`.trim();
    throw new LauncherProblem(`apt-get could not install ${name}:\n${words}\n${advice}`);
  }
}

/** Debian would else make and start a cluster that nobody asked for, on port 5432. */
async function forbidDebiansOwnCluster(prefix, asRoot) {
  if (prefix.length === 0) {
    mkdirSync(path.dirname(clusterSettings), { recursive: true });
    writeFileSync(clusterSettings, 'create_main_cluster = false\n');
    return;
  }
  const folder = path.dirname(clusterSettings);
  const script = `mkdir -p ${folder} && echo 'create_main_cluster = false' > ${clusterSettings}`;
  await asRoot('sh', '-c', script);
}
