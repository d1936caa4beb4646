import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { expect, it } from 'vitest';
import { asCurl, asPython, exampleRequest } from '@/lib/schemas/api-examples';
import { apiRoutes } from '@/lib/schemas/api-routes';
import { parseInput, parseQuery } from '@/lib/schemas/input';

const origin = 'http://127.0.0.1:3210';
const examples = apiRoutes.flatMap((route) => {
  const request = exampleRequest(route, origin);
  return request ? [[`${route.method} ${route.path}`, route, request] as const] : [];
});

it.each(examples)('is taken by its schemas: %s', (_, route, { address, body }) => {
  const { pathname, searchParams } = new URL(address);
  const pattern = new RegExp(`^${route.path.replace(/\{\w+\}/g, '[^/]+')}$`);
  expect(pathname).toMatch(pattern);
  if (route.query) expect(() => parseQuery(route.query as never, searchParams)).not.toThrow();
  else expect([...searchParams]).toEqual([]);
  if (route.body) expect(() => parseInput(route.body as never, body)).not.toThrow();
  else expect(body).toBeUndefined();
});

it('is Python that compiles, in every route', () => {
  const folder = mkdtempSync(path.join(tmpdir(), 'api-examples-'));
  try {
    const files = examples.map(([, , request], i) => {
      const file = path.join(folder, `example_${i}.py`);
      writeFileSync(file, asPython(request));
      return file;
    });
    expect(files.length).toBeGreaterThan(80);
    execFileSync('python3', ['-m', 'py_compile', ...files], { stdio: 'pipe' });
  } finally {
    rmSync(folder, { recursive: true });
  }
});

it('says the same in the words of both languages', () => {
  for (const [name, , request] of examples) {
    const [curl, python] = [asCurl(request), asPython(request)];
    expect(curl, name).toContain(request.address);
    expect(python, name).toContain(JSON.stringify(request.address));
    expect(curl.includes('$RAREBOUND_TOKEN'), name).toBe(request.isSigned);
    expect(python.includes('RAREBOUND_TOKEN'), name).toBe(request.isSigned);
  }
});
