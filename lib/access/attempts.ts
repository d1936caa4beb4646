import {
  type RateLimiterAbstract,
  RateLimiterMemory,
  RateLimiterPostgres,
  RateLimiterRes,
} from 'rate-limiter-flexible';
import type { Sequelize } from 'sequelize';
import { config } from '@/lib/config';
import { TooMany } from '@/lib/errors';
import { database } from '@/models';
import { sha256Hex } from '@/models/digest';

const MINUTE_S = 60;

/** What may be tried how often: points within so many seconds. */
export const limits = {
  'sign-in-account-address': { points: 5, seconds: 15 * MINUTE_S },
  'sign-in-address': { points: 30, seconds: MINUTE_S },
  'sign-in-account': { points: 100, seconds: 24 * 60 * MINUTE_S },
  'sign-up-address': { points: 20, seconds: MINUTE_S },
  'token-requests': { points: 600, seconds: MINUTE_S },
  'anonymous-requests': { points: 60, seconds: MINUTE_S },
  // A survey may come as one small file a star, dropped together.
  uploads: { points: 120, seconds: MINUTE_S },
  // A page draws its figures one by one; each is a few milliseconds of work.
  figures: { points: 120, seconds: MINUTE_S },
  'link-address': { points: 30, seconds: 15 * MINUTE_S },
  'link-account': { points: 3, seconds: 15 * MINUTE_S },
  'reset-address': { points: 20, seconds: 15 * MINUTE_S },
  'second-factor': { points: 5, seconds: 15 * MINUTE_S },
  'password-changes': { points: 10, seconds: 15 * MINUTE_S },
  notes: { points: 120, seconds: 60 * MINUTE_S },
  invitations: { points: 60, seconds: 60 * MINUTE_S },
} as const;
export type LimitName = keyof typeof limits;

/** Addresses of mail stand in no table of attempts in clear. */
export const attemptKey = (email: string) => sha256Hex(email).slice(0, 32);

const limiters = new WeakMap<Sequelize, Map<LimitName, RateLimiterAbstract>>();

/** Counts in PostgreSQL, so that all web processes count together; in memory while it is down. */
function limiter(name: LimitName): RateLimiterAbstract {
  const connection = database();
  let known = limiters.get(connection);
  if (!known) {
    known = new Map();
    limiters.set(connection, known);
  }
  let found = known.get(name);
  if (!found) {
    const { points, seconds } = limits[name];
    const options = { keyPrefix: name, points, duration: seconds };
    found = new RateLimiterPostgres({
      ...options,
      storeClient: connection,
      storeType: 'sequelize',
      tableName: 'rate_limit',
      tableCreated: true,
      insuranceLimiter: new RateLimiterMemory(options),
    });
    known.set(name, found);
  }
  return found;
}

/** "40 seconds", "14 minutes": the length of a wait as a person reads it. */
export function describeWait(seconds: number): string {
  if (seconds < 2 * MINUTE_S) return seconds === 1 ? '1 second' : `${seconds} seconds`;
  return `${Math.ceil(seconds / MINUTE_S)} minutes`;
}

/** What is left of a limit, as the headers of an answer tell it. */
export interface Budget {
  name: LimitName;
  remaining: number;
  resetS: number;
}

const secondsUntil = (result: RateLimiterRes) => Math.max(1, Math.ceil(result.msBeforeNext / 1000));

function refuseUntil(result: RateLimiterRes, sentence: string): never {
  const seconds = secondsUntil(result);
  throw new TooMany(`${sentence} Try again in ${describeWait(seconds)}.`, seconds);
}

/**
 * Counts one attempt.
 *
 * @param tell is given what is left, be the attempt taken or refused
 * @throws TooMany with the length of the wait once the attempts are used up
 */
export async function countAttempt(
  name: LimitName,
  key: string,
  sentence: string,
  tell?: (budget: Budget) => void,
): Promise<void> {
  const tellOf = (result: RateLimiterRes) =>
    tell?.({
      name,
      remaining: Math.max(0, result.remainingPoints),
      resetS: secondsUntil(result),
    });
  try {
    tellOf(await limiter(name).consume(key));
  } catch (refusal) {
    if (!(refusal instanceof RateLimiterRes)) throw refusal;
    tellOf(refusal);
    refuseUntil(refusal, sentence);
  }
}

/** Gives one counted attempt back: it was no wrong one. */
export async function uncountAttempt(name: LimitName, key: string): Promise<void> {
  await limiter(name).reward(key);
}

/** Forgets the attempts of a key: its owner has proved who they are. */
export async function forgetAttempts(name: LimitName, key: string): Promise<void> {
  await limiter(name).delete(key);
}

/**
 * The address that a request came from, as far as it can be believed.
 *
 * X-Forwarded-For is written by whoever sends the request, unless a proxy of ours stands before the
 * server; then its last entry is the proxy's own word. Else all requests share one name.
 */
export function addressOf(headers: Headers): string {
  if (!config().isBehindProxy) return 'direct';
  const entries = headers.get('x-forwarded-for')?.split(',') ?? [];
  return entries[entries.length - 1]?.trim().slice(0, 45) || 'direct';
}
