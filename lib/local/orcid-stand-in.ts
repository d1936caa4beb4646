import { createHash, randomBytes } from 'node:crypto';
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import { orcidCheckCharacter } from '@/lib/schemas/orcid';
import { demoPeople } from './demo/people';

export interface StandInOptions {
  clientId: string;
  clientSecret: string;
  /** The only site that codes are sent to. */
  webAddress: string;
}

interface Grant {
  orcid: string;
  name: string;
  redirectUri: string;
  challenge: string;
  endsAt: number;
}

const CODE_LASTS_MS = 60_000;
const LONGEST_FORM_BYTES = 10_000;

/** iDs below the range from which real ones are given, so that each belongs to nobody. */
function inventedOrcid(number: number): string {
  const digits = `00000000202600${number}`;
  return `${digits}${orcidCheckCharacter(digits)}`.replace(/(.{4})(?=.)/g, '$1-');
}

/** The people of the demonstration, as a provider would know them. */
export const standInPeople = demoPeople.map(({ name }, i) => ({
  name,
  orcid: inventedOrcid(i + 1),
}));

const escapeHtml = (text: string) =>
  text.replace(/[&<>"']/g, (sign) => `&#${sign.codePointAt(0)};`);

async function formOf(request: IncomingMessage): Promise<URLSearchParams> {
  let text = '';
  for await (const part of request) {
    text += String(part);
    if (text.length > LONGEST_FORM_BYTES) break;
  }
  return new URLSearchParams(text.slice(0, LONGEST_FORM_BYTES));
}

function page(asked: URLSearchParams): string {
  const hidden = [...asked]
    .map(
      ([key, value]) =>
        `<input type="hidden" name="${escapeHtml(key)}" value="${escapeHtml(value)}">`,
    )
    .join('');
  const people = standInPeople
    .map(
      ({ name, orcid }) =>
        `<p><button name="orcid" value="${orcid}">${escapeHtml(name)}, ${orcid}</button></p>`,
    )
    .join('');
  return `<!doctype html><html lang="en"><head><meta charset="utf-8">
<meta name="viewport" content="width=device-width"><title>Stand-in for ORCID</title>
<style>body{font:16px/1.5 sans-serif;max-width:34em;margin:2em auto;padding:0 1em}
button{font:inherit;padding:.4em .8em;width:100%;text-align:left}</style></head><body>
<h1>Stand-in for ORCID</h1>
<p>It belongs to the demonstration on this machine: the people are invented, and nobody is asked for
a password. Who are you?</p>
<form method="post" action="/oauth/authorize">${hidden}${people}
<p><button name="deny" value="yes">Nobody: deny it</button></p></form></body></html>`;
}

function sendPage(response: ServerResponse, status: number, html: string, target = ''): void {
  response.writeHead(status, {
    'content-type': 'text/html; charset=utf-8',
    'content-security-policy': `default-src 'none'; style-src 'unsafe-inline'; form-action 'self' ${target}; frame-ancestors 'none'`,
    'cache-control': 'no-store',
    'x-content-type-options': 'nosniff',
  });
  response.end(html);
}

function sendJson(response: ServerResponse, status: number, body: unknown): void {
  response.writeHead(status, { 'content-type': 'application/json', 'cache-control': 'no-store' });
  response.end(JSON.stringify(body));
}

const challengeOf = (verifier: string) => createHash('sha256').update(verifier).digest('base64url');

/**
 * A provider that behaves as ORCID does where the laboratory looks: a code that works once, for the
 * client and the address that asked for it, and the iD beside the token. It believes everybody, so
 * it runs in the demonstration on one machine and in tests, nowhere else.
 */
export function createOrcidStandIn(options: StandInOptions): Server {
  const grants = new Map<string, Grant>();
  const origin = new URL(options.webAddress).origin;

  const faultOf = (asked: URLSearchParams): string | null => {
    if (asked.get('client_id') !== options.clientId) return 'The client is not known.';
    const target = asked.get('redirect_uri') ?? '';
    if (!URL.canParse(target) || new URL(target).origin !== origin) {
      return 'The address to go back to is not the one of the client.';
    }
    if (asked.get('response_type') !== 'code') return 'Only codes are given.';
    return asked.get('code_challenge_method') === 'S256' ? null : 'PKCE is missing.';
  };

  const grant = (asked: URLSearchParams): string => {
    const target = new URL(asked.get('redirect_uri') ?? '');
    target.searchParams.set('state', asked.get('state') ?? '');
    const orcid = asked.get('orcid');
    if (orcid === null) {
      target.searchParams.set('error', 'access_denied');
      return target.href;
    }
    const code = randomBytes(16).toString('base64url');
    grants.set(code, {
      orcid,
      name: standInPeople.find((person) => person.orcid === orcid)?.name ?? '',
      redirectUri: asked.get('redirect_uri') ?? '',
      challenge: asked.get('code_challenge') ?? '',
      endsAt: Date.now() + CODE_LASTS_MS,
    });
    target.searchParams.set('code', code);
    return target.href;
  };

  /** Status and body of the answer. */
  const tokenFor = (form: URLSearchParams): [number, object] => {
    const isClient =
      form.get('client_id') === options.clientId &&
      form.get('client_secret') === options.clientSecret;
    if (!isClient) return [401, { error: 'invalid_client' }];
    const code = form.get('code') ?? '';
    const given = grants.get(code);
    grants.delete(code);
    const isRight =
      given !== undefined &&
      given.endsAt > Date.now() &&
      form.get('grant_type') === 'authorization_code' &&
      form.get('redirect_uri') === given.redirectUri &&
      challengeOf(form.get('code_verifier') ?? '') === given.challenge;
    if (!isRight) return [400, { error: 'invalid_grant' }];
    const token = {
      access_token: randomBytes(16).toString('base64url'),
      token_type: 'bearer',
      expires_in: 3600,
      scope: '/authenticate',
      orcid: given.orcid,
      name: given.name,
    };
    return [200, token];
  };

  const answer = async (request: IncomingMessage, response: ServerResponse): Promise<void> => {
    const { pathname, searchParams } = new URL(request.url ?? '/', 'http://stand-in');
    const what = `${request.method} ${pathname}`;
    if (what === 'GET /') return sendPage(response, 200, 'Stand-in for ORCID');
    if (what === 'POST /oauth/token') return sendJson(response, ...tokenFor(await formOf(request)));
    if (pathname !== '/oauth/authorize') return sendPage(response, 404, 'There is no such page.');
    const asked = request.method === 'POST' ? await formOf(request) : searchParams;
    const fault = faultOf(asked);
    if (fault !== null) return sendPage(response, 400, fault);
    if (request.method !== 'POST') return sendPage(response, 200, page(asked), origin);
    response.writeHead(302, { location: grant(asked), 'cache-control': 'no-store' });
    response.end();
  };

  return createServer((request, response) => {
    answer(request, response).catch((error: unknown) => {
      process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
      response.writeHead(500).end();
    });
  });
}

function required(name: string): string {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set`);
  return value;
}

function main(): void {
  const address = new URL(required('ORCID_ISSUER'));
  const server = createOrcidStandIn({
    clientId: required('ORCID_CLIENT_ID'),
    clientSecret: required('ORCID_CLIENT_SECRET'),
    webAddress: required('NEXTAUTH_URL'),
  });
  server.listen(Number(address.port), '127.0.0.1');
  process.on('SIGTERM', () => {
    server.close(() => process.exit(0));
    server.closeAllConnections();
  });
}

if (process.argv[1] && /orcid-stand-in\.js$/.test(process.argv[1])) main();
