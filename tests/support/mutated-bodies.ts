import { type ZodType, z } from 'zod';

export interface Shape {
  type?: string | string[];
  const?: unknown;
  enum?: unknown[];
  anyOf?: Shape[];
  oneOf?: Shape[];
  allOf?: Shape[];
  properties?: Record<string, Shape>;
  required?: string[];
  additionalProperties?: boolean | Shape;
  items?: Shape;
  prefixItems?: Shape[];
  minItems?: number;
  minimum?: number;
  format?: string;
}

export type Path = (string | number)[];
export interface Mutation {
  path: Path;
  what: string;
  value: unknown;
  /** What must stand in the body first: the form, of several, that the field belongs to. */
  given: [Path, unknown][];
  /** Whether no schema may take it; else the work must cope with it. */
  isRefused: boolean;
}

const ABSENT = Symbol('absent');

export const shapeOf = (schema: ZodType): Shape =>
  z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any', reused: 'inline' }) as Shape;

const typesOf = ({ type }: Shape): string[] => (Array.isArray(type) ? type : type ? [type] : []);
const formsOf = (shape: Shape): Shape[] =>
  (shape.anyOf ?? shape.oneOf)?.flatMap(formsOf) ?? [shape];
const takesNull = (shape: Shape) =>
  formsOf(shape).some((one) => typesOf(one).includes('null') || typesOf(one).length === 0);

/** A value of the shape with every optional field; rules between fields may not hold. */
export function sampleOf(shape: Shape): unknown {
  const [first] = formsOf(shape).filter((one) => !typesOf(one).every((type) => type === 'null'));
  const one = first ?? shape;
  if (one.const !== undefined) return one.const;
  if (one.enum) return one.enum[0];
  if (one.allOf) return Object.assign({}, ...one.allOf.map(sampleOf));
  switch (typesOf(one)[0]) {
    case 'object':
      return Object.fromEntries(
        Object.entries(one.properties ?? {}).map(([key, member]) => [key, sampleOf(member)]),
      );
    case 'array':
      if (one.prefixItems) return one.prefixItems.map(sampleOf);
      return Array.from({ length: Math.max(1, one.minItems ?? 1) }, () =>
        sampleOf(one.items ?? {}),
      );
    case 'boolean':
      return true;
    case 'integer':
    case 'number':
      return Math.max(1, one.minimum ?? 1);
    case 'null':
      return null;
    default:
      return one.format === 'uuid' ? '3f6c1f0a-5a0e-4c0e-9d52-0d6a4a7f8b11' : 'text';
  }
}

const isA = (shape: Shape, type: string) =>
  formsOf(shape).some((one) => typesOf(one).includes(type) || typesOf(one).length === 0);
const isText = (shape: Shape) =>
  formsOf(shape).some(
    (one) => typesOf(one).includes('string') && !one.enum && one.const === undefined,
  );

/** Half of a pair, and the one sign that the database's text cannot hold. */
const EVIL = ['a\ud800', 'a\u0000b', '\u202eabc', '💫'.repeat(100), "'; drop table star --"];

function ofValue(path: Path, shape: Shape): Mutation[] {
  const one = (what: string, value: unknown, isRefused: boolean): Mutation => ({
    ...{ path, what, value, isRefused },
    given: [],
  });
  const numeric = isA(shape, 'number') || isA(shape, 'integer');
  return [
    ...(takesNull(shape) ? [] : [one('null', null, true)]),
    ...(isA(shape, 'object') ? [] : [one('an object', { a: 1 }, true)]),
    ...(numeric ? [] : [one('a number', 7, true)]),
    ...(isA(shape, 'array') ? [one('a huge list', Array(20_000).fill('x'), false)] : []),
    ...(numeric ? [1e308, -1e308, 2 ** 53, 0.5, -1].map((n) => one(`${n}`, n, false)) : []),
    ...(isText(shape)
      ? [
          one('a huge text', 'x'.repeat(300_000), true),
          ...EVIL.map((t) => one(JSON.stringify(t), t, false)),
        ]
      : [one('a text', 'a text', true)]),
  ];
}

function withinForm(one: Shape, path: Path): Mutation[] {
  const isOpen = one.additionalProperties !== undefined && one.additionalProperties !== false;
  const extra = { what: 'one too many', value: 1, isRefused: true, given: [] };
  const absent = { what: 'absent', value: ABSENT, isRefused: true, given: [] };
  return [
    ...(typesOf(one)[0] === 'object' && !isOpen ? [{ path: [...path, 'surplus'], ...extra }] : []),
    ...Object.entries(one.properties ?? {}).flatMap(([key, member]) => {
      const at = [...path, key];
      const isNeeded = one.required?.includes(key);
      return [...(isNeeded ? [{ path: at, ...absent }] : []), ...mutationsOf(member, at)];
    }),
    ...(one.items ? mutationsOf(one.items, [...path, 0]) : []),
  ];
}

/** Everything that is done to a body: each field absent, null, of another type, huge, or one too many. */
export function mutationsOf(shape: Shape, path: Path = []): Mutation[] {
  const own = path.length === 0 ? [] : ofValue(path, shape);
  const forms = formsOf(shape);
  const within = forms.flatMap((one) =>
    withinForm(one, path).map((mutation) =>
      forms.length === 1
        ? mutation
        : { ...mutation, given: [[path, sampleOf(one)], ...mutation.given] as [Path, unknown][] },
    ),
  );
  return [...own, ...within];
}

type Node = Record<string | number, unknown>;

function put(root: Node, path: Path, value: unknown): void {
  let at = root;
  for (const [i, key] of path.slice(0, -1).entries()) {
    if (typeof at[key] !== 'object' || at[key] === null) {
      at[key] = typeof path[i + 1] === 'number' ? [] : {};
    }
    at = at[key] as Node;
  }
  const last = path[path.length - 1];
  if (value === ABSENT) delete at[last];
  else at[last] = value;
}

/** A copy of the body with the mutation in it; what leads there is made where it is missing. */
export function mutated(body: unknown, { path, value, given }: Mutation): unknown {
  const root = { body: structuredClone(body) } as Node;
  for (const [where, form] of given) put(root, ['body', ...where], structuredClone(form));
  put(root, ['body', ...path], value);
  return root.body;
}
