import { request as askPlain, type IncomingMessage } from 'node:http';
import { request as askSecure } from 'node:https';
import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { setTimeout as pause } from 'node:timers/promises';
import { LabError } from '@/lib/errors';

/** Longer than any answer of a repository should be: its metadata and a list of files. */
const LONGEST_ANSWER_BYTES = 4 << 20;
const SILENCE_MS = 30_000;
const MOST_TRIES = 6;
const FIRST_PAUSE_MS = 1000;
const LONGEST_PAUSE_MS = 60_000;

/** The repository refuses, or stays away for longer than anybody waits. */
export class RepositoryFault extends LabError {
  constructor(message: string) {
    super('repository', 502, message);
  }
}

/** An answer that trying again may change. */
class Passing extends Error {
  constructor(
    message: string,
    readonly retryAfterMs?: number,
  ) {
    super(message);
  }
}

export interface Asked {
  method: 'GET' | 'POST' | 'PUT';
  path: string;
  json?: unknown;
  /** Opened anew for each try. */
  content?: { open(): Readable; byteLength: number; headers: Record<string, string> };
  /** Statuses that are answers and no refusals, besides 2xx. */
  also?: readonly number[];
}

export interface Answered {
  status: number;
  body: unknown;
}

export interface ExchangeOptions {
  url: string;
  token: string;
  signal: AbortSignal;
  /** Between two tries; given by tests that have no minute to spare. */
  wait?: (ms: number, signal: AbortSignal) => Promise<void>;
}

const waitFor = (ms: number, signal: AbortSignal) => pause(ms, undefined, { signal });

/** Retry-After as seconds or as a date. */
function readRetryAfter(value: string | undefined): number | undefined {
  if (value === undefined) return undefined;
  if (/^\d+$/.test(value.trim())) return Number(value) * 1000;
  const at = Date.parse(value);
  return Number.isNaN(at) ? undefined : Math.max(0, at - Date.now());
}

async function readAnswer(response: IncomingMessage): Promise<unknown> {
  const parts: Buffer[] = [];
  let length = 0;
  for await (const part of response) {
    length += (part as Buffer).length;
    if (length > LONGEST_ANSWER_BYTES)
      throw new RepositoryFault('The repository’s answer is endless');
    parts.push(part as Buffer);
  }
  const text = Buffer.concat(parts).toString('utf8');
  if (text === '') return null;
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

/** One request over one connection, whose body is streamed. */
async function askOnce(asked: Asked, { url, token, signal }: ExchangeOptions): Promise<Answered> {
  const address = new URL(`${url}${asked.path}`);
  const json = asked.json === undefined ? undefined : Buffer.from(JSON.stringify(asked.json));
  const ask = address.protocol === 'https:' ? askSecure : askPlain;
  const request = ask(address, {
    method: asked.method,
    signal,
    timeout: SILENCE_MS,
    headers: {
      accept: 'application/json',
      authorization: `Bearer ${token}`,
      ...(json && { 'content-type': 'application/json', 'content-length': json.length }),
      ...asked.content?.headers,
      ...(asked.content && { 'content-length': asked.content.byteLength }),
    },
  });
  request.on('timeout', () => request.destroy(new Error('it stayed silent')));
  const answer = new Promise<IncomingMessage>((resolve, reject) => {
    request.on('response', resolve);
    request.on('error', reject);
  });
  const sent = asked.content
    ? pipeline(asked.content.open(), request)
    : new Promise<void>((resolve) => request.end(json, () => resolve()));
  // An answer may come before everything is sent, and a refused upload ends the sending.
  sent.catch(() => undefined);
  const response = await answer;
  const body = await readAnswer(response);
  // Refused before all of it was sent: nobody takes the rest.
  if (!request.writableFinished) request.destroy();
  return readStatus(asked, response, body);
}

function readStatus(asked: Asked, response: IncomingMessage, body: unknown): Answered {
  const status = response.statusCode ?? 0;
  if ((status >= 200 && status < 300) || asked.also?.includes(status)) return { status, body };
  if (status === 408 || status === 425 || status === 429 || status >= 500) {
    const wait = readRetryAfter(response.headers['retry-after']);
    throw new Passing(`it answered ${status}`, wait);
  }
  if (status === 401 || status === 403) {
    throw new RepositoryFault(
      'The repository does not know our token. Whoever runs this server has to renew it',
    );
  }
  const said = body as { detail?: unknown; message?: unknown } | null;
  const words = [said?.detail, said?.message].find((text) => typeof text === 'string') as
    | string
    | undefined;
  const quote = words === undefined ? '' : `: ${words.slice(0, 200)}`;
  throw new RepositoryFault(`The repository refused with ${status}${quote}`);
}

/**
 * Asks a repository, and again after a pause where it is busy, at fault or away.
 *
 * @throws RepositoryFault when it refuses, or after the last try, in a sentence
 */
export async function exchange(asked: Asked, options: ExchangeOptions): Promise<Answered> {
  const { signal, wait = waitFor } = options;
  for (let attempt = 1; ; attempt++) {
    signal.throwIfAborted();
    try {
      return await askOnce(asked, options);
    } catch (error) {
      signal.throwIfAborted();
      if (error instanceof LabError) throw error;
      if (attempt >= MOST_TRIES) {
        const why = error instanceof Passing ? error.message : 'the connection broke';
        throw new RepositoryFault(
          `The repository could not be reached in ${MOST_TRIES} tries; the last time ${why}. What had arrived is kept there: send the release again later`,
        );
      }
      const own = FIRST_PAUSE_MS * 2 ** (attempt - 1);
      const told = error instanceof Passing ? error.retryAfterMs : undefined;
      await wait(Math.min(told ?? own, LONGEST_PAUSE_MS), signal);
    }
  }
}
