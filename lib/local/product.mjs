import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { LauncherProblem, root } from './environment.mjs';
import { findFreePort } from './ports.mjs';
import { run } from './process-run.mjs';
import {
  mailboxService,
  orcidService,
  repositoryService,
  webService,
  workerService,
} from './services.mjs';

/**
 * Where one running product lives; `npm start` and the browser tests each have their own.
 *
 * @typedef {object} Product
 * @property {() => string} databaseUrl asked at each start: the port of the database may change
 * @property {string} folder for mail and what the seed writes
 * @property {string} bundleFolder of worker, mailbox and scripts
 * @property {string} distFolder of the web build
 * @property {number} port
 * @property {string} address
 * @property {{ mailUrl: string, mailboxUrl?: string, smtpPort?: number }} mail
 * @property {Record<string, string>} [orcidStandIn] what web server and stand-in are told of each other
 * @property {Record<string, string>} [repositoryStandIn] what worker and stand-in are told of each other
 * @property {Record<string, string>} secrets
 * @property {boolean} isDevelopment
 */

/** Addresses of the local mailbox, or the mail server that MAIL_URL names. */
export async function chooseMail(/** @type {number} */ webPort, given = process.env.MAIL_URL) {
  if (given) return { mailUrl: given, mailboxUrl: process.env.MAILBOX_URL };
  const pagePort = await findFreePort(webPort + 1, [webPort]);
  const smtpPort = await findFreePort(pagePort + 1, [webPort, pagePort]);
  return {
    mailUrl: `smtp://127.0.0.1:${smtpPort}`,
    mailboxUrl: `http://127.0.0.1:${pagePort}`,
    smtpPort,
  };
}

/**
 * Settings of the stand-in for ORCID: only for the demonstration on this machine, and only where no
 * client of the real one is set up.
 *
 * @returns {Promise<Record<string, string> | undefined>}
 */
export async function chooseOrcidStandIn(
  /** @type {number} */ webPort,
  /** @type {boolean} */ isDemo,
  /** @type {NodeJS.ProcessEnv} */ given = process.env,
) {
  if (!isDemo || given.NEXTAUTH_URL || given.ORCID_CLIENT_ID || given.RAREBOUND_HOST)
    return undefined;
  const port = await findFreePort(webPort + 3, [webPort, webPort + 1, webPort + 2]);
  return {
    ORCID_ISSUER: `http://127.0.0.1:${port}`,
    ORCID_CLIENT_ID: 'demonstration',
    ORCID_CLIENT_SECRET: randomBytes(16).toString('hex'),
  };
}

/**
 * Settings of the practice repository: only for the demonstration on this machine, and only where no
 * open repository is set up.
 *
 * @returns {Promise<Record<string, string> | undefined>}
 */
export async function chooseRepositoryStandIn(
  /** @type {number} */ webPort,
  /** @type {boolean} */ isDemo,
  /** @type {NodeJS.ProcessEnv} */ given = process.env,
) {
  if (!isDemo || given.NEXTAUTH_URL || given.REPOSITORY_URL || given.RAREBOUND_HOST)
    return undefined;
  const port = await findFreePort(webPort + 4, [webPort + 1, webPort + 2, webPort + 3]);
  return {
    REPOSITORY_URL: `http://127.0.0.1:${port}`,
    REPOSITORY_TOKEN: randomBytes(16).toString('hex'),
  };
}

/** @returns {NodeJS.ProcessEnv} what each process of the product is told */
export function productEnvironment(/** @type {Product} */ product) {
  const { mailUrl, mailboxUrl } = product.mail;
  return {
    ...process.env,
    NODE_ENV: product.isDevelopment ? 'development' : 'production',
    DATABASE_URL: product.databaseUrl(),
    NEXTAUTH_URL: product.address,
    ...product.secrets,
    ...product.orcidStandIn,
    ...product.repositoryStandIn,
    MAIL_URL: mailUrl,
    ...(mailboxUrl === undefined ? {} : { MAILBOX_URL: mailboxUrl }),
    RAREBOUND_DATA_DIR: product.folder,
    RAREBOUND_BUNDLE_DIR: product.bundleFolder,
    NEXT_TELEMETRY_DISABLED: '1',
  };
}

/**
 * Runs one of the bundled scripts to its end.
 *
 * @param {Product} product
 * @param {string} name
 * @param {{ isPatient?: boolean }} [options] whether it takes what time others leave
 */
export async function runScript(product, name, options = {}) {
  const script = path.join(root, product.bundleFolder, `lib/local/${name}.js`);
  const { code, output, stdout } = await run(process.execPath, ['--enable-source-maps', script], {
    ...options,
    env: productEnvironment(product),
  });
  if (code !== 0) throw new LauncherProblem(`The step "${name}" failed:\n${output.trim()}`);
  return stdout.trim();
}

/**
 * Starts mailbox, stand-ins, worker and web server, and returns when the web server answers.
 *
 * @param {import('./supervisor.mjs').Supervisor} supervisor
 * @param {Product} product
 */
export async function startProduct(supervisor, product) {
  const environment = () => productEnvironment(product);
  if (product.mail.smtpPort !== undefined) {
    await supervisor.start(mailboxService({ ...product, environment }));
  }
  if (product.orcidStandIn !== undefined) {
    await supervisor.start(orcidService({ ...product, environment }));
  }
  if (product.repositoryStandIn !== undefined) {
    await supervisor.start(repositoryService({ ...product, environment }));
  }
  await Promise.all([
    supervisor.start(workerService({ ...product, environment })),
    supervisor.start(webService({ ...product, environment })),
  ]);
}

/** @returns {{ role: string, email: string, password: string }[]} as the seed wrote them */
export function readDemoSignIns(/** @type {string} */ folder) {
  const file = path.join(folder, 'demo-sign-ins.json');
  return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : [];
}
