import { createHash } from 'node:crypto';
import { expect, test } from '@playwright/test';
import { signedIn } from '../harden/visitor';
import { signInOf } from './demonstration';
import { OwnWebServer } from './own-web-server';

const LAB = '/api/v1/collaborations/lantern-array';
const PART = { 'content-type': 'application/offset+octet-stream', 'tus-resumable': '1.0.0' };
const MOST_DRAIN_MS = 10_000;
const pause = (ms: number) => new Promise<void>((resolve) => setTimeout(resolve, ms));

const targets = (count: number, prefix: string) =>
  new TextEncoder().encode(
    [
      'name,distance,age',
      ...Array.from({ length: count }, (_, i) => `${prefix} ${i},${20 + i / 10},30`),
    ].join('\n'),
  );

/** A person's requests to a server that may be gone in between. */
async function visitorOf(server: OwnWebServer) {
  const cookie = await signedIn(
    { address: server.address } as Parameters<typeof signedIn>[0],
    signInOf('owner of Lantern Array'),
  );
  const ask = (path: string, init: RequestInit = {}) =>
    fetch(`${server.address}${LAB}/${path}`, {
      ...init,
      headers: { cookie, origin: server.address, ...init.headers },
    });
  return {
    ask,
    async post<Answer>(path: string, body: unknown): Promise<Answer> {
      const answer = await ask(path, {
        method: 'POST',
        headers: { 'content-type': 'application/json' },
        body: JSON.stringify(body),
      });
      expect(answer.ok, await answer.clone().text()).toBe(true);
      return (await answer.json()) as Answer;
    },
    /** A file begun, to be sent in parts. */
    async begin(survey: string, byteLength: number): Promise<string> {
      const query = new URLSearchParams({ kind: 'targets', survey });
      const begun = await ask(`unfinished-files?${query}`, {
        method: 'POST',
        headers: { 'tus-resumable': '1.0.0', 'upload-length': String(byteLength) },
      });
      expect(begun.status, await begun.clone().text()).toBe(201);
      return ((await begun.json()) as { id: string }).id;
    },
    async offsetOf(id: string): Promise<number> {
      const answer = await ask(`unfinished-files/${id}`, { headers: PART });
      return Number(answer.headers.get('upload-offset'));
    },
    part: (id: string, offset: number, body: BodyInit) =>
      ask(`unfinished-files/${id}`, {
        method: 'PATCH',
        headers: { ...PART, 'upload-offset': String(offset) },
        body,
        duplex: 'half',
      } as RequestInit),
    read: (id: string, survey: string) =>
      ask(
        `uploads?${new URLSearchParams({ kind: 'targets', survey, name: 'a.csv', unfinished: id })}`,
        { method: 'POST' },
      ),
  };
}

/** Bytes that come slowly, as over a bad line. */
const slowly = (bytes: Uint8Array, steps: number, everyMs: number) =>
  new ReadableStream({
    async start(stream) {
      const size = Math.ceil(bytes.length / steps);
      for (let at = 0; at < bytes.length; at += size) {
        stream.enqueue(bytes.slice(at, at + size));
        await pause(everyMs);
      }
      stream.close();
    },
  });

let server: OwnWebServer;
test.beforeEach(async () => {
  server = await OwnWebServer.start();
});
test.afterEach(async () => {
  await server.end('SIGKILL');
});

test('kill -9 of the web server: an upload goes on at its offset, an import is whole or absent', async () => {
  const visitor = await visitorOf(server);
  const survey = (await visitor.post<{ slug: string }>('surveys', { name: 'Killed', band: 'H' }))
    .slug;
  const bytes = targets(400, 'Upload');

  const id = await visitor.begin(survey, bytes.length);
  const half = bytes.length >> 1;
  expect((await visitor.part(id, 0, bytes.slice(0, half))).status).toBe(204);
  const sending = visitor.part(id, half, slowly(bytes.slice(half), 20, 100)).catch(() => 'cut');
  await pause(700);
  await server.end('SIGKILL');
  expect(await sending).toBe('cut');
  await server.begin();
  const offset = await visitor.offsetOf(id);
  expect(offset).toBeGreaterThanOrEqual(half);
  expect(offset).toBeLessThan(bytes.length);
  expect((await visitor.part(id, offset, bytes.slice(offset))).status).toBe(204);
  const read = await visitor.read(id, survey);
  expect(read.status, await read.clone().text()).toBe(201);
  const upload = (await read.json()) as { id: string; sha256: string };
  expect(upload.sha256).toBe(createHash('sha256').update(bytes).digest('hex'));

  const count = async () =>
    ((await (await visitor.ask(`surveys/${survey}/targets?limit=1`)).json()) as { total: number })
      .total;
  const storing = visitor.post(`uploads/${upload.id}/store`, {}).catch(() => 'cut');
  await pause(25);
  await server.end('SIGKILL');
  await storing;
  await server.begin();
  expect([0, 400]).toContain(await count());
  if ((await count()) === 0) await visitor.post(`uploads/${upload.id}/store`, {});
  expect(await count()).toBe(400);
});

test('SIGTERM: the web server finishes what it was asked, takes nothing new, and ends', async () => {
  const visitor = await visitorOf(server);
  const survey = (await visitor.post<{ slug: string }>('surveys', { name: 'Drained', band: 'H' }))
    .slug;
  const bytes = targets(200, 'Drain');
  const id = await visitor.begin(survey, bytes.length);
  const sending = visitor.part(id, 0, slowly(bytes, 10, 150));
  await pause(500);
  const asked = Date.now();
  const ending = server.end('SIGTERM');
  await pause(200);
  expect(await server.isUp()).toBe(false);
  expect((await sending).status).toBe(204);
  await ending;
  expect(Date.now() - asked).toBeLessThan(MOST_DRAIN_MS);
  await server.begin();
  expect(await visitor.offsetOf(id)).toBe(bytes.length);
});
