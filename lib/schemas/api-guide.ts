import { asCurl, asPython, exampleRequest } from './api-examples';
import { type ApiRoute, takesIfMatch, takesKey, team } from './api-route';
import { apiRoutes } from './api-routes';
import type { OpenApiDocument } from './openapi';

/** A field of a body, an answer or a named shape, with its place: "recipe.surveyIds[]". */
export interface GuideField {
  name: string;
  type: string;
  /** Name of the shape that it holds. */
  shape: string | null;
  isRequired: boolean;
  words: string;
}

export interface GuideOperation {
  id: string;
  method: string;
  path: string;
  summary: string;
  access: ApiRoute['access'];
  parameters: (GuideField & { where: string })[];
  body: GuideField[];
  answer: GuideField[];
  status: number;
  files: readonly string[];
  /** Statuses of refusals that may come. */
  refusals: number[];
  /** Null for what only a signed-in browser may do. */
  example: { curl: string; python: string } | null;
}

export interface GuideGroup {
  noun: string;
  title: string;
  operations: GuideOperation[];
}

interface Schema {
  $ref?: string;
  type?: string | string[];
  const?: unknown;
  enum?: unknown[];
  anyOf?: Schema[];
  oneOf?: Schema[];
  allOf?: Schema[];
  properties?: Record<string, Schema>;
  required?: string[];
  items?: Schema;
  additionalProperties?: Schema | boolean;
  minimum?: number;
  maximum?: number;
  maxLength?: number;
  format?: string;
  default?: unknown;
  description?: string;
}

const DEEPEST = 3;
const shapeName = (reference: string | undefined) => reference?.split('/').at(-1) ?? null;
const choicesOf = ({ anyOf, oneOf }: Schema) => anyOf ?? oneOf ?? [];

/** "text, one of a, b", "list of Survey", "number or null". */
export function typeWords(schema: Schema): string {
  if (schema.$ref) return shapeName(schema.$ref) ?? '';
  if (schema.const !== undefined) return JSON.stringify(schema.const);
  if (schema.enum) return schema.enum.map((one) => JSON.stringify(one)).join(' | ');
  const choices = choicesOf(schema);
  if (choices.length > 0) return [...new Set(choices.map(typeWords))].join(' or ');
  if (schema.allOf) return schema.allOf.map(typeWords).join(' with ');
  const types = Array.isArray(schema.type) ? schema.type : [schema.type ?? 'any'];
  return types
    .map((type) => {
      if (type === 'array') return `list of ${schema.items ? typeWords(schema.items) : 'any'}`;
      if (type === 'string') return schema.format ? `text (${schema.format})` : 'text';
      return type;
    })
    .join(' or ');
}

function boundsOf({ minimum, maximum, maxLength, default: usual }: Schema): string {
  const parts = [
    minimum !== undefined && minimum > Number.MIN_SAFE_INTEGER && `from ${minimum}`,
    maximum !== undefined && maximum < Number.MAX_SAFE_INTEGER && `to ${maximum}`,
    maxLength !== undefined && `at most ${maxLength} characters`,
    usual !== undefined && `${JSON.stringify(usual)} unless said`,
  ];
  return parts.filter(Boolean).join(', ');
}

/** The shape that a field leads to, be it a list of them or one that may be missing. */
function reachedShape(schema: Schema): string | null {
  const inner = schema.items ?? choicesOf(schema).find(({ $ref }) => $ref);
  return shapeName(schema.$ref ?? inner?.$ref);
}

function fieldsOf(schema: Schema, place = '', depth = 0): GuideField[] {
  const own = Object.entries(schema.properties ?? {}).flatMap(([key, member]) => {
    const name = place === '' ? key : `${place}.${key}`;
    const field: GuideField = {
      name,
      type: typeWords(member),
      shape: reachedShape(member),
      isRequired: schema.required?.includes(key) ?? false,
      words: [member.description, boundsOf(member)].filter(Boolean).join('; '),
    };
    return [field, ...(depth < DEEPEST ? fieldsOf(member, name, depth + 1) : [])];
  });
  const items = schema.items && depth < DEEPEST ? fieldsOf(schema.items, `${place}[]`, depth) : [];
  const parts = (schema.allOf ?? []).flatMap((part) => fieldsOf(part, place, depth));
  const choices = choicesOf(schema).map((choice) => fieldsOf(choice, place, depth));
  return onceEach([...own, ...items, ...parts, ...ofAnyChoice(choices)]);
}

const joined = (words: string[], between: string) =>
  [...new Set(words)].filter(Boolean).join(between);

/** Fields of several shapes of which one is given: each with every type that it may have. */
function ofAnyChoice(choices: GuideField[][]): GuideField[] {
  const all = choices.flat();
  return onceEach(all).map((field) => {
    const same = all.filter(({ name }) => name === field.name);
    return {
      ...field,
      type: joined(
        same.map(({ type }) => type),
        same.every(({ type }) => type.startsWith('"')) ? ' | ' : ' or ',
      ),
      isRequired: same.length === choices.length && same.every(({ isRequired }) => isRequired),
      words: joined(
        same.map(({ words }) => words),
        ', or ',
      ),
    };
  });
}

const onceEach = (fields: GuideField[]): GuideField[] =>
  fields.filter(({ name }, at) => fields.findIndex((field) => field.name === name) === at);

/** What a body or an answer is: its fields, or the one shape that it consists of. */
function contentOf(schema: Schema | undefined): GuideField[] {
  if (!schema) return [];
  const fields = schema.$ref ? [] : fieldsOf(schema);
  if (fields.length > 0) return fields;
  const whole = { name: '', isRequired: true, words: schema.description ?? '' };
  return [{ ...whole, type: typeWords(schema), shape: reachedShape(schema) }];
}

function refusalsOf(one: ApiRoute): number[] {
  const isWrite = one.method !== 'get';
  const may = {
    400:
      one.query !== undefined ||
      one.body !== undefined ||
      one.headers !== undefined ||
      takesKey(one),
    401: one.access !== 'open',
    403: one.access !== 'open',
    404: one.path.includes('{'),
    409: isWrite,
    412: takesIfMatch(one, apiRoutes) || one.headers !== undefined,
    413: one.body !== undefined || one.isUpload,
    415: one.body !== undefined || one.uploadType !== undefined,
    422: one.body !== undefined || one.isUpload || takesKey(one),
    429: one.access !== 'session',
  };
  return Object.entries(may).flatMap(([status, is]) => (is ? [Number(status)] : []));
}

interface Operation {
  operationId: string;
  parameters?: {
    name: string;
    in: string;
    required?: boolean;
    schema: Schema;
    description?: string;
  }[];
  requestBody?: { content: Record<string, { schema: Schema }> };
  responses: Record<string, { content?: Record<string, { schema: Schema }> }>;
}

function operationOf(document: OpenApiDocument, one: ApiRoute, origin: string): GuideOperation {
  const paths = document.paths as unknown as Record<string, Record<string, Operation>>;
  const { operationId, parameters = [], requestBody, responses } = paths[one.path][one.method];
  const [status] = Object.keys(responses).filter((key) => key !== 'default');
  const request = exampleRequest(one, origin);
  return {
    id: operationId,
    method: one.method.toUpperCase(),
    path: one.path,
    summary: one.summary,
    access: one.access,
    parameters: parameters.map((given) => ({
      name: given.name,
      where: given.in,
      type: typeWords(given.schema),
      shape: reachedShape(given.schema),
      isRequired: given.required ?? false,
      words: [given.description ?? given.schema.description, boundsOf(given.schema)]
        .filter(Boolean)
        .join('; '),
    })),
    body: contentOf(requestBody?.content['application/json']?.schema),
    answer: contentOf(responses[status].content?.['application/json']?.schema),
    status: Number(status),
    files: [...(one.isUpload ? [] : (one.files ?? []))],
    refusals: refusalsOf(one),
    example: request && { curl: asCurl(request), python: asPython(request) },
  };
}

/** The noun of an address: what follows the collaboration, or the version of the API. */
function nounOf(path: string): string {
  if (path === team) return 'collaboration';
  const rest = path.startsWith(`${team}/`) ? path.slice(team.length) : path.slice('/api/v1'.length);
  return rest.split('/')[1].replace(/\.json$/, '');
}

const titleOf = (noun: string) => `${noun[0].toUpperCase()}${noun.slice(1).replace(/-/g, ' ')}`;

/** The document by noun, in the order of the alphabet, as its pages show it. */
export function buildGuide(document: OpenApiDocument, origin: string): GuideGroup[] {
  const groups = new Map<string, GuideOperation[]>();
  for (const one of apiRoutes) {
    const noun = nounOf(one.path);
    groups.set(noun, [...(groups.get(noun) ?? []), operationOf(document, one, origin)]);
  }
  return [...groups]
    .sort(([a], [b]) => a.localeCompare(b, 'en'))
    .map(([noun, operations]) => ({ noun, title: titleOf(noun), operations }));
}

/** The shapes that have a name, with their fields. */
export function guideShapes(document: OpenApiDocument): { name: string; fields: GuideField[] }[] {
  const schemas = (document.components?.schemas ?? {}) as Record<string, Schema>;
  return Object.entries(schemas).map(([name, schema]) => ({ name, fields: contentOf(schema) }));
}

/** Operations that hold every word, in their address, summary or noun. */
export function searchGuide(groups: readonly GuideGroup[], words: string): GuideGroup[] {
  const wanted = words.toLowerCase().split(/\s+/).filter(Boolean);
  const fits = (noun: string, { method, path, summary, access }: GuideOperation) => {
    const text = `${noun} ${method} ${path} ${summary} ${access}`.toLowerCase();
    return wanted.every((word) => text.includes(word));
  };
  return groups
    .map((group) => ({
      ...group,
      operations: group.operations.filter((one) => fits(group.noun, one)),
    }))
    .filter(({ operations }) => operations.length > 0);
}
