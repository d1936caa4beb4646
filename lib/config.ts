import { z } from 'zod';

const environment = z.object({
  DATABASE_URL: z.string().min(1),
  DATABASE_POOL: z.coerce.number().int().min(1).default(10),
  NEXTAUTH_URL: z.string().default('http://127.0.0.1:3210'),
  NEXTAUTH_SECRET: z.string().min(16).default('only-for-tests-0123456789abcdef'),
  MAIL_URL: z.string().optional(),
  MAILBOX_URL: z.string().optional(),
  MAIL_FROM: z.string().default('rarebound@localhost'),
  /** Who confirms ORCID iDs; without a client nobody signs in with one. */
  ORCID_ISSUER: z.url().default('https://orcid.org'),
  ORCID_CLIENT_ID: z.string().optional(),
  ORCID_CLIENT_SECRET: z.string().optional(),
  RAREBOUND_DATA_DIR: z.string().default('.data'),
  RAREBOUND_BUNDLE_DIR: z.string().default('dist'),
  RAREBOUND_WORKER_THREADS: z.coerce.number().int().min(1).optional(),
  /** An open repository to which releases can be sent, and the token that it knows us by. */
  REPOSITORY_URL: z.url({ protocol: /^https?$/ }).optional(),
  REPOSITORY_TOKEN: z.string().min(1).optional(),
  /** 'yes' when a proxy of ours stands before the server and writes X-Forwarded-For. */
  RAREBOUND_BEHIND_PROXY: z.enum(['yes', 'no']).default('no'),
  /** Who reads /api/metrics sends this as a bearer token; without it there is no such page. */
  RAREBOUND_METRICS_TOKEN: z.string().min(16).optional(),
  NODE_ENV: z.string().default('development'),
});

export interface OrcidSettings {
  issuer: string;
  clientId: string;
  clientSecret: string;
}

export interface Config {
  databaseUrl: string;
  databasePool: number;
  webAddress: string;
  authSecret: string;
  mailUrl: string | undefined;
  mailboxUrl: string | undefined;
  mailFrom: string;
  /** Null where signing in with ORCID is not offered. */
  orcid: OrcidSettings | null;
  dataDirectory: string;
  /** Where the bundled worker and thread entries lie. */
  bundleDirectory: string;
  workerThreads: number | undefined;
  /** Null where releases cannot be deposited. */
  repository: { url: string; token: string } | null;
  isBehindProxy: boolean;
  metricsToken: string | undefined;
  isProduction: boolean;
}

/** @throws Error for half a client, and for a provider that anybody on the way could speak for */
function orcidOf(env: z.infer<typeof environment>): OrcidSettings | null {
  const { ORCID_ISSUER: issuer, ORCID_CLIENT_ID: clientId, ORCID_CLIENT_SECRET: secret } = env;
  if (!clientId && !secret) return null;
  if (!clientId || !secret) {
    throw new Error('ORCID_CLIENT_ID and ORCID_CLIENT_SECRET go together: one of them is not set');
  }
  const { protocol, hostname } = new URL(issuer);
  if (protocol !== 'https:' && hostname !== '127.0.0.1') {
    throw new Error('ORCID_ISSUER must begin with https://');
  }
  return { issuer: issuer.replace(/\/$/, ''), clientId, clientSecret: secret };
}

function repositoryOf(url: string | undefined, token: string | undefined): Config['repository'] {
  if (url === undefined && token === undefined) return null;
  if (url === undefined || token === undefined) {
    throw new Error('REPOSITORY_URL and REPOSITORY_TOKEN are set together, or neither');
  }
  return { url: url.replace(/\/+$/, ''), token };
}

let parsed: Config | undefined;

/** The environment, parsed once at first use; nothing else reads process.env. */
export function config(): Config {
  if (parsed) return parsed;
  const env = environment.parse(process.env);
  if (env.NODE_ENV === 'production' && !process.env.NEXTAUTH_SECRET) {
    throw new Error('NEXTAUTH_SECRET is not set: sessions cannot be signed');
  }
  parsed = {
    databaseUrl: env.DATABASE_URL,
    databasePool: env.DATABASE_POOL,
    webAddress: env.NEXTAUTH_URL,
    authSecret: env.NEXTAUTH_SECRET,
    mailUrl: env.MAIL_URL,
    mailboxUrl: env.MAILBOX_URL,
    mailFrom: env.MAIL_FROM,
    orcid: orcidOf(env),
    dataDirectory: env.RAREBOUND_DATA_DIR,
    bundleDirectory: env.RAREBOUND_BUNDLE_DIR,
    workerThreads: env.RAREBOUND_WORKER_THREADS,
    repository: repositoryOf(env.REPOSITORY_URL, env.REPOSITORY_TOKEN),
    isBehindProxy: env.RAREBOUND_BEHIND_PROXY === 'yes',
    metricsToken: env.RAREBOUND_METRICS_TOKEN,
    isProduction: env.NODE_ENV === 'production',
  };
  return parsed;
}

/** Forgets the environment, for a process that changes its own: the next use reads it anew. */
export function forgetConfig(): void {
  parsed = undefined;
}
