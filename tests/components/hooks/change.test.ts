import { readFileSync } from 'node:fs';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { ApiProblem } from '@/components/hooks/api-problem';
import { ChangedMeanwhile, change, isSame, removeShown } from '@/components/hooks/change';
import { takesIfMatch } from '@/lib/schemas/api-route';
import { apiRoutes } from '@/lib/schemas/api-routes';

interface Asked {
  method: string;
  path: string;
  ifMatch: string | null;
}

/** A server that answers what the list says, one after another, and what it was asked. */
function serve(...answers: Response[]): Asked[] {
  const asked: Asked[] = [];
  vi.stubGlobal('fetch', async (path: string, init: RequestInit) => {
    const headers = new Headers(init.headers);
    asked.push({ method: init.method ?? 'GET', path, ifMatch: headers.get('if-match') });
    return answers.shift() ?? new Response(null, { status: 404 });
  });
  return asked;
}
afterEach(() => vi.unstubAllGlobals());

const thing = z.object({ name: z.string(), runs: z.number() });
const read = (name: string, runs: number, etag: string | null = `"${name}${runs}"`) =>
  Response.json({ name, runs }, { headers: etag === null ? {} : { etag } });
const refused = () =>
  Response.json(
    { type: 'about:blank', title: 'x', status: 412, code: 'changed-meanwhile', detail: 'x' },
    { status: 412 },
  );
const rename = () =>
  change('/thing', thing, {
    part: ({ name }) => name,
    opened: 'Auk',
    body: { name: 'Tern' },
    answer: thing,
  });

describe('a change of what a form was opened with', () => {
  it('names the state that was compared', async () => {
    const asked = serve(read('Auk', 1), read('Tern', 1));
    expect(await rename()).toEqual({ name: 'Tern', runs: 1 });
    expect(asked).toEqual([
      { method: 'GET', path: '/thing', ifMatch: null },
      { method: 'PATCH', path: '/thing', ifMatch: '"Auk1"' },
    ]);
  });

  it('sends nothing where somebody else was first, and says what stands there', async () => {
    const asked = serve(read('Gull', 1));
    const reason = await rename().catch((thrown: unknown) => thrown);
    expect(reason).toBeInstanceOf(ChangedMeanwhile);
    expect((reason as ChangedMeanwhile).now).toBe('Gull');
    expect(asked.map(({ method }) => method)).toEqual(['GET']);
  });

  it('compares again where something else moved in between, and then finds the other person', async () => {
    const calm = serve(read('Auk', 1), refused(), read('Auk', 2), read('Tern', 2));
    expect(await rename()).toEqual({ name: 'Tern', runs: 2 });
    expect(calm.map(({ ifMatch }) => ifMatch)).toEqual([null, '"Auk1"', null, '"Auk2"']);
    serve(read('Auk', 1), refused(), read('Gull', 1));
    await expect(rename()).rejects.toBeInstanceOf(ChangedMeanwhile);
  });

  it('is never sent without a tag, nor for ever', async () => {
    const asked = serve(read('Auk', 1, null));
    await expect(rename()).rejects.toMatchObject({ code: 'no-tag' });
    expect(asked.map(({ method }) => method)).toEqual(['GET']);
    const turns = Array.from({ length: 20 }, () => [read('Auk', 1), refused()]).flat();
    const restless = serve(...turns);
    await expect(rename()).rejects.toBeInstanceOf(ApiProblem);
    expect(restless.length).toBeLessThanOrEqual(10);
  });

  it('deletes only what was shown', async () => {
    const shown = { part: ({ name }: z.infer<typeof thing>) => name, opened: 'Auk' };
    const asked = serve(
      read('Auk', 1),
      refused(),
      read('Auk', 2),
      new Response(null, { status: 204 }),
    );
    await removeShown('/thing', thing, shown);
    expect(asked.map(({ method, ifMatch }) => [method, ifMatch])).toEqual([
      ['GET', null],
      ['DELETE', '"Auk1"'],
      ['GET', null],
      ['DELETE', '"Auk2"'],
    ]);
    const other = serve(read('Gull', 2));
    await expect(removeShown('/thing', thing, shown)).rejects.toBeInstanceOf(ChangedMeanwhile);
    expect(other.map(({ method }) => method)).toEqual(['GET']);
  });

  it('knows the same values in another order from others', () => {
    expect(isSame({ a: [1, { b: null }], c: undefined }, { a: [1, { b: null }] })).toBe(true);
    expect(isSame({ a: 1, b: 2 }, { b: 2, a: 1 })).toBe(true);
    for (const [one, other] of [
      [
        [1, 2],
        [2, 1],
      ],
      [null, {}],
      [[], {}],
      ['1', 1],
      [{ a: 1 }, {}],
    ])
      expect(isSame(one, other)).toBe(false);
  });
});

describe('every form that changes something', () => {
  const hooks = import.meta.glob<Record<string, unknown>>('/components/hooks/use-*.ts');
  const sources = import.meta.glob('/components/**/*.{ts,tsx}');
  // Parts of a file name their place by Upload-Offset, which is their condition.
  const changes = apiRoutes.filter(({ method, isUpload }) => method === 'patch' && !isUpload);
  const decided = apiRoutes.filter((route) => takesIfMatch(route, apiRoutes));
  const templateOf = (path: string) => new RegExp(`^${path.replace(/\{\w+\}/g, '[^/]+')}$`);

  it('may say what it was opened with, wherever it is sent', () => {
    expect(changes.length).toBeGreaterThan(12);
    expect(changes.filter((route) => !takesIfMatch(route, apiRoutes))).toEqual([]);
    expect(apiRoutes.map(({ method }) => String(method))).not.toContain('put');
  });

  it('goes through the one function that compares', () => {
    const writers = Object.keys(sources).filter((name) =>
      /['"](PATCH|PUT)['"]/i.test(readFileSync(name.slice(1), 'utf8')),
    );
    expect(writers.sort()).toEqual(['/components/hooks/change.ts', '/components/hooks/request.ts']);
  });

  it('reads the address that it changes, and the table of routes takes its tag there', async () => {
    const reached = new Set<string>();
    for (const load of Object.values(hooks)) {
      for (const [name, hook] of Object.entries(await load())) {
        if (typeof hook !== 'function' || !/\b(change|removeShown)\)?\(/.test(String(hook)))
          continue;
        const asked = serve();
        // Each is asked with words for everything: the address is all that is looked at.
        await Promise.resolve()
          .then(() => hook('x', 'x', 'x', 'x', 'x'))
          .catch(() => undefined);
        expect(asked, name).toHaveLength(1);
        const [{ path, method }] = asked;
        const route = decided.find((one) => templateOf(one.path).test(path.split('?')[0]));
        expect([name, method, route !== undefined]).toEqual([name, 'GET', true]);
        reached.add(route?.path ?? '');
      }
    }
    expect(reached.size).toBeGreaterThanOrEqual(12);
  });
});
