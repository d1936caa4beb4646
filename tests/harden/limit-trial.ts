import { setTimeout as pause } from 'node:timers/promises';
import { type LimitName, limits } from '@/lib/access/attempts';
import { withRows } from './laboratory-rows';
import { attemptOf, limitCases } from './limit-cases';
import { Visitor } from './limit-visitor';
import type { RunningProduct } from './row';

/** Longer windows are brought forward in the database once they are used up. */
const LONGEST_WAIT_S = 60;
const BROUGHT_FORWARD_MS = 6000;
/** The header names whole seconds: more than one before its moment, the limit must still stand. */
const EARLY_MS = 1500;
const LATE_MS = 100;
const REFUSED = 429;

export interface Trial {
  limit: LimitName;
  points: number;
  /** Attempts that were taken before the first refusal. */
  taken: number;
  retryAfterS: number;
  /** The machine was so busy that the time before the end could not be tried. */
  isTooSlow: boolean;
  faults: string[];
}

interface Answered {
  status: number;
  retryAfterS: number;
  /** The server looked at its clock between the two. */
  sentMs: number;
  atMs: number;
}

async function read(asked: Promise<Response>): Promise<Answered> {
  const sentMs = Date.now();
  const answer = await asked;
  const atMs = Date.now();
  await answer.arrayBuffer();
  const retryAfterS = Number(answer.headers.get('retry-after'));
  return { status: answer.status, retryAfterS, sentMs, atMs };
}

/** Moves the end of what was used up, as if the time had passed. */
function bringForward(product: RunningProduct, limit: LimitName, endMs: number): Promise<unknown> {
  const { points } = limits[limit];
  return withRows(product, (query) =>
    query(`update rate_limit set expire = $2 where key like $1 || ':%' and points > $3`, [
      limit,
      endMs,
      points,
    ]),
  );
}

/** Uses one limit up, asks as somebody else, and asks again just before and after its end. */
export async function tryLimit(product: RunningProduct, limit: LimitName): Promise<Trial> {
  const { points, seconds } = limits[limit];
  const limited = limitCases[limit];
  const attempt = attemptOf(limited);
  const [who, other] = [await Visitor.arrive(product), await Visitor.arrive(product)];
  await limited.prepare?.(who);
  await limited.prepare?.(other);
  const faults: string[] = [];
  const expect = (isRight: boolean, words: string) => {
    if (!isRight) faults.push(`${limit}: ${words}`);
  };

  let taken = 0;
  let refused = await read(attempt(who, 0));
  while (refused.status !== REFUSED && taken <= 2 * points) {
    expect(refused.status < 500, `attempt ${taken + 1} answered ${refused.status}`);
    refused = await read(attempt(who, ++taken));
  }
  expect(taken === points, `${taken} attempts were taken, the limit is ${points}`);
  const { retryAfterS } = refused;
  const isStated = retryAfterS >= 1 && retryAfterS <= seconds;
  expect(isStated, `Retry-After: ${retryAfterS} in a window of ${seconds} s`);

  for (const [file, ask] of Object.entries(limited.routes)) {
    const { status, retryAfterS: wait } = await read(ask(who));
    expect(status === REFUSED && wait >= 1, `${file} answered ${status}, Retry-After ${wait}`);
    const { status: ofOther } = await read(ask(other));
    const isFree = ofOther !== REFUSED && ofOther < 500;
    expect(isFree, `${file} answered ${ofOther} to somebody else`);
  }
  const { status: ofOther } = await read(attempt(other, 0));
  expect(ofOther !== REFUSED && ofOther < 500, `somebody else was answered ${ofOther}`);

  if (seconds > LONGEST_WAIT_S) {
    await bringForward(product, limit, Date.now() + BROUGHT_FORWARD_MS);
    refused = await read(attempt(who, taken));
    const most = BROUGHT_FORWARD_MS / 1000;
    const isRight = refused.status === REFUSED && refused.retryAfterS <= most;
    expect(isRight, `${refused.status}, Retry-After ${refused.retryAfterS} with ${most} s left`);
  }
  const waitMs = 1000 * refused.retryAfterS;
  const earliestMs = refused.sentMs + waitMs - 1000;
  await pause(refused.sentMs + waitMs - EARLY_MS - Date.now());
  const early = await read(attempt(who, taken));
  const isTooSlow = early.atMs > earliestMs;
  const isHeld = early.status === REFUSED || isTooSlow;
  expect(isHeld, `${early.status} more than a second before Retry-After`);
  await pause(refused.atMs + waitMs + LATE_MS - Date.now());
  const late = await read(attempt(who, taken));
  const isOver = late.status !== REFUSED && late.status < 500;
  expect(isOver, `${late.status} ${LATE_MS} ms after Retry-After`);
  return { limit, points, taken, retryAfterS, isTooSlow, faults };
}
