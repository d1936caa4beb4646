import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { ApiProblem } from './api-problem';
import { type AnswerSchema, request, requestNothing, requestTagged } from './request';

/** Somebody changed the same thing since it was opened: what stands there now, and who was last. */
export class ChangedMeanwhile<Part = unknown> extends ApiProblem {
  readonly now: Part;
  readonly last: LastNews | null;

  constructor(now: Part, last: LastNews | null) {
    super({
      type: 'about:blank',
      title: 'Changed meanwhile',
      status: 412,
      code: 'changed-meanwhile',
      detail: `${lastWords(last)} Nothing was done: look at it as it is now, then decide.`,
    });
    this.name = 'ChangedMeanwhile';
    this.now = now;
    this.last = last;
  }
}

/** The newest entry of the activity about a thing; null where it has none or the reader sees none. */
export interface LastNews {
  person: string;
  /** Completes the name. */
  what: string;
  at: string;
}

const lastWords = (last: LastNews | null) =>
  last === null
    ? 'It was changed since this page was opened.'
    : `It was changed since this page was opened; the last news of it: ${last.person} ${last.what}.`;

interface Opened<Thing, Part> {
  /** What of the thing the form edits. */
  part(thing: Thing): Part;
  /** That part, as the form was opened with it. */
  opened: NoInfer<Part>;
}

interface Change<Thing, Part, Answer> extends Opened<Thing, Part> {
  body: unknown;
  /** How the answer to the change is read. */
  answer: AnswerSchema<Answer>;
}

/** Those fields of a thing that a part of it has. */
export function pick<Thing extends object, Name extends keyof Thing>(
  thing: Thing,
  part: Pick<Thing, Name>,
): Pick<Thing, Name> {
  const names = Object.keys(part) as Name[];
  return Object.fromEntries(names.map((name) => [name, thing[name]])) as Pick<Thing, Name>;
}

/** The same values, wherever their keys stand; what is absent is undefined. */
export function isSame(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) !== Array.isArray(b)) return false;
  const [one, other] = [a as Record<string, unknown>, b as Record<string, unknown>];
  const keys = new Set([...Object.keys(one), ...Object.keys(other)]);
  return [...keys].every((key) => isSame(one[key], other[key]));
}

/**
 * Changes the thing at an address if what the form edits still is what the form was opened with.
 *
 * @throws ChangedMeanwhile with the part as it is now; ApiProblem for every other refusal
 */
export function change<Thing, Part, Answer>(
  path: string,
  thing: AnswerSchema<Thing>,
  asked: Change<Thing, Part, Answer>,
): Promise<Answer> {
  const { body } = asked;
  return whileSame(path, thing, asked, (ifMatch) =>
    request(path, asked.answer, { method: 'PATCH', body, ifMatch }),
  );
}

/** Deletes the thing at an address if it still is what was shown. @throws as `change` */
export function removeShown<Thing, Part>(
  path: string,
  thing: AnswerSchema<Thing>,
  shown: Opened<Thing, Part>,
): Promise<void> {
  return whileSame(path, thing, shown, (ifMatch) =>
    requestNothing(path, { method: 'DELETE', ifMatch }),
  );
}

/**
 * Sends what somebody decided while they saw a part of a thing.
 *
 * The thing is read anew. Where its part differs, nothing is sent; else the decision is sent with the
 * tag of what was read, so that nobody comes between. What they did not see (a job that goes on, a
 * new run, another field) may have moved: then it is read and compared again.
 */
async function whileSame<Thing, Part, Answer>(
  path: string,
  thing: AnswerSchema<Thing>,
  seen: Opened<Thing, Part>,
  send: (ifMatch: string) => Promise<Answer>,
): Promise<Answer> {
  for (let turn = 0; turn < TURNS; turn++) {
    const etag = await requireSame(path, thing, seen);
    try {
      return await send(etag);
    } catch (reason) {
      if (!(reason instanceof ApiProblem) || reason.status !== 412) throw reason;
    }
  }
  throw new ApiProblem({
    type: 'about:blank',
    title: 'Changed meanwhile',
    status: 412,
    code: 'changed-meanwhile',
    detail: 'It changes all the time just now, so nothing was done. Try again in a moment.',
  });
}

const TURNS = 5;

/**
 * The tag of the thing, if its part is what it was.
 *
 * @throws ChangedMeanwhile
 */
export async function requireSame<Thing, Part>(
  path: string,
  thing: AnswerSchema<Thing>,
  { part, opened }: Opened<Thing, Part>,
): Promise<string> {
  const { value, etag } = await requestTagged(path, thing);
  const now = part(value);
  if (!isSame(now, opened)) throw new ChangedMeanwhile(now, await lastNews(path, value));
  if (etag !== null) return etag;
  throw new ApiProblem({
    type: 'about:blank',
    title: 'Unexpected answer',
    status: 200,
    code: 'no-tag',
    detail: 'The answer carries no ETag, so that a change of it could overwrite another one.',
  });
}

async function lastNews(path: string, thing: unknown): Promise<LastNews | null> {
  const collaboration = /^\/api\/v1\/collaborations\/([^/]+)\//.exec(path)?.[1];
  const { id } = Object(thing) as { id?: unknown };
  if (collaboration === undefined || typeof id !== 'string') return null;
  const news = withQuery(apiPath(decodeURIComponent(collaboration), 'activity'), {
    item: id,
    limit: 1,
  });
  // Who it was is told where it is known; a conflict stays one without it.
  const page = await request(news, answer('activityPageSchema')).catch(() => null);
  const [entry] = page?.entries ?? [];
  return entry?.person ? { person: entry.person.name, what: entry.what, at: entry.at } : null;
}
