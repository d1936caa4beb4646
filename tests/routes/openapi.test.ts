import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { GET } from '@/app/api/v1/openapi.json/route';
import type { OpenApiDocument } from '@/lib/schemas/openapi';
import { call, webAddress } from '../support/people';

const answer = await call(GET);
const document = (await answer.json()) as OpenApiDocument;
const api = path.resolve(import.meta.dirname, '../../app/api/v1');

/** "get /api/v1/…" of every handler that a route file exports. */
function handlersOnDisk(): string[] {
  return readdirSync(api, { recursive: true, encoding: 'utf8' })
    .filter((file) => path.basename(file) === 'route.ts')
    .flatMap((file) => {
      const folder = path.dirname(file).split(path.sep).join('/');
      const address = `/api/v1/${folder.replace(/\[(\w+)\]/g, '{$1}')}`;
      const source = readFileSync(path.join(api, file), 'utf8');
      const exported = [
        ...source.matchAll(/^export (?:const|async function|function) ([A-Z]+)\b/gm),
      ];
      return exported.map(([, method]) => `${method.toLowerCase()} ${address}`);
    });
}

type Operation = {
  operationId: string;
  parameters?: { name: string; in: string }[];
  requestBody?: { content: Record<string, unknown> };
  responses: Record<string, { content?: Record<string, { schema: unknown }> }>;
  security: Record<string, string[]>[];
};
const operations = Object.entries(document.paths ?? {}).flatMap(([address, item]) =>
  Object.entries(item as Record<string, Operation>).map(
    ([method, operation]) => [`${method} ${address}`, operation] as const,
  ),
);
const operation = (name: string): Operation => {
  const found = operations.find(([key]) => key === name)?.[1];
  if (!found) throw new Error(`no operation ${name}`);
  return found;
};

function* nodesOf(value: unknown): Generator<Record<string, unknown>> {
  if (typeof value !== 'object' || value === null) return;
  yield value as Record<string, unknown>;
  for (const member of Object.values(value)) yield* nodesOf(member);
}

describe('GET /api/v1/openapi.json', () => {
  it('is open, and says where the server is', () => {
    expect(answer.status).toBe(200);
    expect(document.openapi).toBe('3.1.0');
    expect(document.servers).toEqual([{ url: webAddress() }]);
  });

  it('describes every handler that there is, and no other', () => {
    const described = operations.map(([name]) => name).sort();
    expect(described).toEqual(handlersOnDisk().sort());
  });

  it('names each operation once', () => {
    const ids = operations.map(([, { operationId }]) => operationId);
    expect(new Set(ids).size).toBe(ids.length);
  });

  it('has a parameter for each part of an address in braces', () => {
    for (const [name, { parameters = [] }] of operations) {
      const wanted = [...name.matchAll(/\{(\w+)\}/g)].map(([, part]) => part);
      const given = parameters.filter((one) => one.in === 'path').map((one) => one.name);
      expect(given.sort(), name).toEqual(wanted.sort());
    }
  });

  it('answers every refusal with a problem document', () => {
    for (const [name, { responses }] of operations) {
      const refused = responses.default?.content?.['application/problem+json'];
      expect(refused?.schema, name).toEqual({ $ref: '#/components/schemas/Problem' });
      expect(Object.keys(responses), name).toHaveLength(2);
    }
  });

  it('refers to shapes that are there', () => {
    const known = new Set(
      Object.keys(document.components?.schemas ?? {}).map((name) => `#/components/schemas/${name}`),
    );
    const used = [...nodesOf(document)].flatMap((node) =>
      typeof node.$ref === 'string' ? [node.$ref] : [],
    );
    expect(used.length).toBeGreaterThan(100);
    for (const reference of used) expect(known).toContain(reference);
  });

  it('writes patterns that compile', () => {
    const patterns = [...nodesOf(document)].flatMap((node) =>
      typeof node.pattern === 'string' ? [node.pattern] : [],
    );
    expect(patterns.length).toBeGreaterThan(5);
    for (const pattern of patterns) {
      expect(() => new RegExp(pattern, 'u')).not.toThrow();
      expect(pattern).not.toMatch(/\/[a-z]*$/);
    }
  });

  it('says which scope a token needs', () => {
    const team = '/api/v1/collaborations/{collaboration}';
    expect(operation(`get ${team}/surveys`).security).toContainEqual({ token: ['read'] });
    expect(operation(`post ${team}/populations`).security).toContainEqual({ token: ['write'] });
    expect(operation(`post ${team}/analyses/{analysis}/runs`).security).toContainEqual({
      token: ['run'],
    });
    expect(operation(`post ${team}/tokens`).security).toEqual([{ session: [] }]);
    expect(operation('post /api/v1/sign-up').security).toEqual([{}]);
  });

  it('leaves nothing of the inside in it', () => {
    expect(JSON.stringify(document)).not.toMatch(/passwordHash|tokenHash|codeHash|collaborationId/);
  });
});
