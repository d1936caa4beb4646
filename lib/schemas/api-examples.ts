import { type ZodType, z } from 'zod';
import { exampleBodies, exampleFiles } from './api-example-bodies';
import { type ApiRoute, takesKey } from './api-route';

/** A request that the handlers take, from which every language of an example is written. */
export interface ExampleRequest {
  method: string;
  address: string;
  /** A token goes along; without one nobody needs to be signed in. */
  isSigned: boolean;
  body?: unknown;
  /** Name of the file that is sent as it is, and its content type. */
  file?: { name: string; type: string };
  /** Of the route's own. */
  headers: [name: string, value: string][];
  /** A write that may be sent again without being done twice. */
  hasKey: boolean;
  answer: 'json' | 'file' | 'nothing';
}

const ID = '3f6c1f0a-5a0e-4c0e-9d52-0d6a4a7f8b11';
/** What stands for the parts of addresses that are no ids. */
const parts: Record<string, string> = {
  collaboration: 'my-team',
  survey: 'plover',
  analysis: 'A-1',
  population: 'P-1',
  release: 'R-1',
  exercise: 'E-1',
  kind: 'targets',
  code: 'the-code',
  token: 'the-token',
};

interface Shape {
  type?: string | string[];
  const?: unknown;
  enum?: unknown[];
  anyOf?: Shape[];
  oneOf?: Shape[];
  allOf?: Shape[];
  properties?: Record<string, Shape>;
  required?: string[];
  items?: Shape;
  prefixItems?: Shape[];
  minItems?: number;
  minimum?: number;
  exclusiveMinimum?: number;
  exclusiveMaximum?: number;
  format?: string;
  pattern?: string;
  minLength?: number;
  default?: unknown;
}

/** Texts of a form that a pattern asks for. */
const texts = ['plover', 'A-1', 'P-1', ID, '0000-0002-1825-0097', 'K', '123456', 'a'.repeat(64)];

function textOf({ format, pattern, minLength = 0 }: Shape): string {
  if (format === 'uuid') return ID;
  if (format === 'email') return 'ada@observatory.example';
  if (format === 'date-time') return '2030-01-31T12:00:00Z';
  if (format === 'date') return '2030-01-31';
  const isFit = (text: string) => !pattern || new RegExp(pattern, 'u').test(text);
  return ['As you name it', ...texts].find((text) => isFit(text) && text.length >= minLength) ?? '';
}

function numberOf({ minimum, exclusiveMinimum = 0, exclusiveMaximum }: Shape): number {
  if (exclusiveMaximum !== undefined && exclusiveMaximum <= 1) return 0.95;
  return Math.max(minimum ?? 1, exclusiveMinimum + 1, 1);
}

/** The least that a schema takes, written as somebody would. */
function exampleOf(shape: Shape): unknown {
  if (shape.const !== undefined) return shape.const;
  if (shape.default !== undefined) return shape.default;
  if (shape.enum) return shape.enum[0];
  const [first] = shape.anyOf ?? shape.oneOf ?? [];
  if (first) return exampleOf(first);
  if (shape.allOf) return Object.assign({}, ...shape.allOf.map(exampleOf));
  switch (Array.isArray(shape.type) ? shape.type[0] : shape.type) {
    case 'object':
      return Object.fromEntries(
        Object.entries(shape.properties ?? {})
          .filter(([key]) => shape.required?.includes(key))
          .map(([key, member]) => [key, exampleOf(member)]),
      );
    case 'array':
      if (shape.prefixItems) return shape.prefixItems.map(exampleOf);
      return shape.items
        ? Array.from({ length: Math.max(1, shape.minItems ?? 1) }, () =>
            exampleOf(shape.items as Shape),
          )
        : [];
    case 'boolean':
      return true;
    case 'integer':
    case 'number':
      return numberOf(shape);
    case 'null':
      return null;
    default:
      return textOf(shape);
  }
}

const shapeOf = (schema: ZodType): Shape =>
  z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any', reused: 'inline' }) as Shape;

function queryOf({ query }: ApiRoute): string {
  if (!query) return '';
  const given = exampleOf(shapeOf(query)) as Record<string, unknown>;
  const asked = Object.entries(given).map(([key, value]) => [key, String(value)]);
  return asked.length > 0 ? `?${new URLSearchParams(asked)}` : '';
}

/**
 * One request to an address of the API that its schemas take; null for what only a signed-in
 * browser may do.
 *
 * @param origin of this server, such as "http://127.0.0.1:3210"
 */
export function exampleRequest(one: ApiRoute, origin: string): ExampleRequest | null {
  if (one.access === 'session') return null;
  const named: Record<string, string | undefined> = { ...parts, file: exampleFiles[one.path] };
  const address = one.path.replace(/\{(\w+)\}/g, (_, name) => named[name] ?? ID);
  const body =
    one.body && (exampleBodies[`${one.method} ${one.path}`] ?? exampleOf(shapeOf(one.body)));
  const type = one.uploadType ?? 'application/octet-stream';
  return {
    method: one.method.toUpperCase(),
    address: `${origin}${address}${queryOf(one)}`,
    isSigned: one.access !== 'open',
    body,
    headers: Object.entries(one.headers ?? {}).map(([name, { example }]) => [name, example]),
    file: one.isUpload ? { name: 'the-file', type } : undefined,
    hasKey: takesKey(one),
    answer: one.answer ? 'json' : one.files ? 'file' : 'nothing',
  };
}

const inShell = (text: string) => `'${text.replace(/'/g, `'\\''`)}'`;

/** As a line of a shell; the token stands in RAREBOUND_TOKEN. */
export function asCurl({
  method,
  address,
  isSigned,
  body,
  file,
  headers,
  hasKey,
  answer,
}: ExampleRequest): string {
  const words = [`curl -sS --fail-with-body ${inShell(address)}`];
  if (method !== 'GET') words.push(`-X ${method}`);
  if (isSigned) words.push('-H "Authorization: Bearer $RAREBOUND_TOKEN"');
  if (hasKey) words.push('-H "Idempotency-Key: $(uuidgen)"');
  for (const [name, value] of headers) words.push(`-H ${inShell(`${name}: ${value}`)}`);
  if (body !== undefined) {
    words.push("-H 'Content-Type: application/json'", `-d ${inShell(JSON.stringify(body))}`);
  }
  if (file) words.push(`-H 'Content-Type: ${file.type}'`, `--data-binary @${file.name}`);
  if (answer === 'file') words.push('-OJ');
  return words.join(' \\\n  ');
}

/** A JSON value as Python writes it, indented by so many spaces. */
function inPython(value: unknown, indent: number): string {
  if (value === null) return 'None';
  if (typeof value === 'boolean') return value ? 'True' : 'False';
  if (typeof value !== 'object') return JSON.stringify(value);
  const pad = ' '.repeat(indent + 4);
  const end = ' '.repeat(indent);
  if (Array.isArray(value)) {
    return `[${value.map((member) => inPython(member, indent)).join(', ')}]`;
  }
  const members = Object.entries(value).map(
    ([key, member]) => `${pad}${JSON.stringify(key)}: ${inPython(member, indent + 4)},\n`,
  );
  return members.length === 0 ? '{}' : `{\n${members.join('')}${end}}`;
}

/** As a script of Python 3 that needs nothing else; the token stands in RAREBOUND_TOKEN. */
export function asPython(given: ExampleRequest): string {
  const { method, address, isSigned, body, file, hasKey, answer } = given;
  const modules = [
    ...(body !== undefined || answer === 'json' ? ['json'] : []),
    ...(isSigned ? ['os'] : []),
    'urllib.request',
    ...(hasKey ? ['uuid'] : []),
  ];
  const headers = [
    ...(isSigned ? ['"Authorization": "Bearer " + os.environ["RAREBOUND_TOKEN"]'] : []),
    ...(hasKey ? ['"Idempotency-Key": str(uuid.uuid4())'] : []),
    ...given.headers.map(([name, value]) => `${JSON.stringify(name)}: ${JSON.stringify(value)}`),
    ...(body !== undefined ? ['"Content-Type": "application/json"'] : []),
    ...(file ? [`"Content-Type": ${JSON.stringify(file.type)}`] : []),
  ];
  const told = {
    json: '    print(json.load(answer))',
    file: '    open("answer", "wb").write(answer.read())',
    nothing: '    print(answer.status)',
  }[answer];
  return [
    ...modules.map((name) => `import ${name}`),
    '',
    'request = urllib.request.Request(',
    `    ${JSON.stringify(address)},`,
    `    method=${JSON.stringify(method)},`,
    ...(headers.length > 0
      ? ['    headers={', ...headers.map((one) => `        ${one},`), '    },']
      : []),
    ...(body !== undefined ? [`    data=json.dumps(${inPython(body, 4)}).encode(),`] : []),
    ...(file ? [`    data=open(${JSON.stringify(file.name)}, "rb").read(),`] : []),
    ')',
    'with urllib.request.urlopen(request) as answer:',
    told,
    '',
  ].join('\n');
}
