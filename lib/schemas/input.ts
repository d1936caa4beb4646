import { type ZodType, z } from 'zod';
import { type Fault, InputError } from '@/lib/errors';

const QUOTED_LENGTH = 40;

/** What was found, at most 40 characters, with control characters spelt out. */
function quote(value: unknown): string {
  if (value === undefined) return 'nothing';
  if (value === null) return 'null';
  if (typeof value === 'number' || typeof value === 'boolean') return String(value);
  if (Array.isArray(value)) return value.length === 1 ? 'a list of 1' : `a list of ${value.length}`;
  if (typeof value === 'object') return 'an object';
  const text = String(value);
  const cut = text.length > QUOTED_LENGTH ? `${text.slice(0, QUOTED_LENGTH)}…` : text;
  return `"${cut.replace(/[\p{Cc}\u202a-\u202e\u2066-\u2069]/gu, (c) => `U+${c.codePointAt(0)?.toString(16).toUpperCase().padStart(4, '0')}`)}"`;
}

function valueAt(root: unknown, path: PropertyKey[]): unknown {
  let value = root;
  for (const key of path) {
    if (typeof value !== 'object' || value === null) return undefined;
    value = Object.hasOwn(value, key) ? (value as Record<PropertyKey, unknown>)[key] : undefined;
  }
  return value;
}

/** What must not come back in an answer, or stand in a log of answers. */
const isSecret = (path: PropertyKey[]) => /password/i.test(String(path[path.length - 1]));
const hide = (value: unknown) =>
  typeof value === 'string' ? `${value.length} characters` : quote(typeof value);

const KIND_NAMES: Record<string, string> = {
  string: 'text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list',
  object: 'an object',
  record: 'an object',
};

/** "more than 0 and less than 1; is this per cent?" → what was expected, and the hint after it. */
function splitHint(message: string): Pick<Fault, 'expected' | 'hint'> {
  const [expected, hint] = message.split('; ', 2);
  if (hint === undefined) return { expected };
  return { expected, hint: `${hint[0].toUpperCase()}${hint.slice(1)}` };
}

/** Schemas that say nothing of their own leave the library's words in the message: we never show those. */
const isOwnWording = (message: string) =>
  !/^(Invalid|Too|Unrecognized|Expected|Required)/.test(message);

function sizeExpected(issue: z.core.$ZodIssueTooBig | z.core.$ZodIssueTooSmall): string {
  const isBig = issue.code === 'too_big';
  const bound = isBig ? issue.maximum : issue.minimum;
  if (issue.origin === 'string') return `${isBig ? 'at most' : 'at least'} ${bound} characters`;
  if (issue.origin === 'array') return `${isBig ? 'at most' : 'at least'} ${bound} entries`;
  if (issue.inclusive === false) return `${isBig ? 'less than' : 'more than'} ${bound}`;
  return `${isBig ? 'at most' : 'at least'} ${bound}`;
}

function sizeCode(issue: z.core.$ZodIssueTooBig | z.core.$ZodIssueTooSmall): string {
  if (issue.origin === 'string') return issue.code === 'too_big' ? 'too-long' : 'too-short';
  if (issue.origin === 'array') return issue.code === 'too_big' ? 'too-many' : 'too-few';
  return 'out-of-range';
}

type Place = (path: PropertyKey[]) => string;

function faultsOf(issue: z.core.$ZodIssue, root: unknown, place: Place): Fault[] {
  const { path, message } = issue;
  const value = valueAt(root, path);
  const item = place(path);
  const found = isSecret(path) ? hide(value) : quote(value);
  const own = isOwnWording(message) ? splitHint(message) : undefined;
  switch (issue.code) {
    case 'unrecognized_keys':
      return issue.keys.map((key) => ({
        code: 'key-unknown',
        item: place([...path, key]),
        message: `The key ${quote(key)} is not known here`,
      }));
    case 'invalid_type': {
      const expected = own?.expected ?? KIND_NAMES[issue.expected] ?? issue.expected;
      const code = value === undefined ? 'value-missing' : wrongTypeCode(issue.expected);
      return [{ code, item, found, expected }];
    }
    case 'too_big':
    case 'too_small':
      return [
        { code: sizeCode(issue), item, found, ...(own ?? { expected: sizeExpected(issue) }) },
      ];
    case 'invalid_value':
      return [
        { code: 'choice-unknown', item, found, expected: issue.values.map(String).join(', ') },
      ];
    case 'invalid_union': {
      const options = (issue as { options?: unknown[] }).options;
      const expected = options?.map(String).join(', ') ?? 'one of the forms that the API describes';
      return [{ code: 'choice-unknown', item, found, expected }];
    }
    case 'invalid_format': {
      if (typeof value === 'string' && /\p{Cc}/u.test(value)) {
        const what = /[\r\n]/.test(value) ? 'a line break' : 'a control character';
        return [{ code: 'control-character', item, found: what, ...(own ?? {}) }];
      }
      return [{ code: 'format-mismatch', item, found, ...(own ?? { expected: issue.format }) }];
    }
    case 'custom': {
      const order = /^(\w+) below (\w+)$/.exec(message);
      if (!order) return [{ code: 'not-allowed-here', item, found, ...splitHint(message) }];
      const parent = path.slice(0, -1);
      const [low, high] = [order[1], order[2]].map((key) => [...parent, key]);
      const values = `${quote(valueAt(root, low))} and ${quote(valueAt(root, high))}`;
      return [
        {
          code: 'range-order',
          item: `${place(low)}, ${place(high)}`,
          found: values,
          expected: message,
        },
      ];
    }
    default:
      return [{ code: 'schema', item, found, ...(own ?? { expected: 'another form' }) }];
  }
}

function wrongTypeCode(expected: string): string {
  if (expected === 'number' || expected === 'int') return 'not-a-number';
  return expected === 'boolean' ? 'not-a-boolean' : 'schema';
}

const inBody: Place = (path) => (path.length === 0 ? 'body' : path.map(String).join('.'));
const inQuery: Place = (path) => `query "${path.map(String).join('.')}"`;

/** No schema nests deeper; what does would end the stack of whoever walks through it. */
const DEEPEST = 64;

const isUnstorable = (text: string) => text.includes('\u0000') || /\p{Cs}/u.test(text);

/** What no text of the database can hold: U+0000, and half of a surrogate pair. */
function unstorable(value: unknown, place: Place, path: PropertyKey[] = []): Fault[] {
  const item = path.length === 0 ? 'body' : place(path);
  if (typeof value === 'string') {
    if (!isUnstorable(value)) return [];
    const found = isSecret(path) ? hide(value) : quote(value.replace(/\p{Cs}/gu, '\ufffd'));
    const code = value.includes('\u0000') ? 'control-character' : 'not-utf8';
    return [{ code, item, found, expected: 'text that UTF-8 can write, without U+0000' }];
  }
  if (typeof value !== 'object' || value === null) return [];
  if (path.length === DEEPEST) {
    const found = `more than ${DEEPEST} levels, one within the other`;
    return [{ code: 'schema', item: 'body', found, expected: 'fewer' }];
  }
  return Object.entries(value).flatMap(([key, member]) => [
    ...(isUnstorable(key) ? unstorable(key, place, path) : []),
    ...unstorable(member, place, [...path, key]),
  ]);
}

function refuse(error: z.ZodError, root: unknown, place: Place, status: number): never {
  const faults = error.issues.flatMap((issue) => faultsOf(issue, root, place));
  const isMalformed = faults.some((fault) => fault.code === 'key-unknown');
  throw new InputError(faults.slice(0, 100), {
    status: isMalformed ? 400 : status,
    count: faults.length,
  });
}

/**
 * The value as its schema reads it.
 *
 * @throws InputError whose faults name the field in `item` ("definition.massMinMjup"): 400 when a key
 *   is not known, else 422
 */
export function parseInput<T>(schema: ZodType<T>, value: unknown): T {
  const unwritable = unstorable(value, inBody);
  if (unwritable.length > 0) {
    throw new InputError(unwritable.slice(0, 100), { count: unwritable.length });
  }
  const parsed = schema.safeParse(value);
  return parsed.success ? parsed.data : refuse(parsed.error, value, inBody, 422);
}

interface Bounds {
  minimum?: number;
  maximum?: number;
}

/** Lower and upper bound of a whole number in a query, said together: "1 to 500". */
function rangeOf(schema: ZodType, key: string): string | undefined {
  const described = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' });
  const bounds = (described.properties?.[key] ?? {}) as Bounds;
  const { minimum, maximum } = bounds;
  if (minimum === undefined || maximum === undefined) return undefined;
  return maximum >= Number.MAX_SAFE_INTEGER ? `${minimum} or more` : `${minimum} to ${maximum}`;
}

/**
 * The query of an address as its schema reads it.
 *
 * @throws InputError, 400, for a key that is given twice, is not known, or holds a wrong value
 */
export function parseQuery<T>(schema: ZodType<T>, search: URLSearchParams): T {
  const given: Record<string, string> = Object.create(null);
  for (const [key, value] of search) {
    if (Object.hasOwn(given, key)) {
      throw new InputError(
        {
          code: 'both-given',
          item: inQuery([key]),
          found: `${quote(key)} twice`,
          expected: 'it once',
        },
        { status: 400 },
      );
    }
    given[key] = value;
  }
  const unwritable = unstorable({ ...given }, inQuery);
  if (unwritable.length > 0) throw new InputError(unwritable.slice(0, 100), { status: 400 });
  const parsed = schema.safeParse({ ...given });
  if (parsed.success) return parsed.data;
  const faults = parsed.error.issues
    .flatMap((issue) =>
      faultsOf(issue, given, inQuery).map((fault) => {
        const range = rangeOf(schema, String(issue.path[0] ?? ''));
        if (fault.code !== 'out-of-range' || range === undefined) return fault;
        return { ...fault, found: String(valueAt(given, issue.path)), expected: range };
      }),
    )
    .slice(0, 100);
  throw new InputError(faults, { status: 400 });
}
