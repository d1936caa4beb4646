import { createHash } from 'node:crypto';
import { expect, test } from '@playwright/test';
import type { ReleaseView } from '@/lib/schemas/releases';
import { signedIn } from '../harden/visitor';
import { signInOf } from './demonstration';
import { OwnWebServer } from './own-web-server';

const COLLABORATIONS = '/api/v1/collaborations';
const PART = { 'content-type': 'application/offset+octet-stream', 'tus-resumable': '1.0.0' };
/** Of a step: shorter than any takes. */
const FIRST_KILL_MS = 30;
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
async function visitorOf(
  server: OwnWebServer,
  role = 'owner of Lantern Array',
  collaboration = 'lantern-array',
) {
  const cookie = await signedIn(
    { address: server.address } as Parameters<typeof signedIn>[0],
    signInOf(role),
  );
  const ask = (path: string, init: RequestInit = {}) =>
    fetch(`${server.address}${COLLABORATIONS}/${collaboration}/${path}`, {
      ...init,
      headers: { cookie, origin: server.address, ...init.headers },
    });
  return {
    ask,
    async get<Answer>(path: string): Promise<Answer> {
      const answer = await ask(path);
      expect(answer.ok, await answer.clone().text()).toBe(true);
      return (await answer.json()) as Answer;
    },
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

test('kill -9 of the web server: a frozen run, a draft and a publication are whole or absent', async () => {
  const of = (role: string) => visitorOf(server, role, 'breakwater');
  const [author, statistician, owner] = await Promise.all(
    ['author', 'statistician', 'owner'].map(of),
  );
  const title = 'Killed on the way';
  const run = (await author.get<{ runs: { id: string }[] }>('analyses/A-2')).runs[0].id;

  /**
   * Takes a step again and again, the server killed a little later in it each time, until it is done:
   * whatever was cut has left nothing.
   */
  async function killUntilDone<State>(
    who: typeof owner,
    [path, body]: [string, unknown],
    stateOf: () => Promise<State>,
    isDone: (state: State) => boolean,
  ): Promise<State> {
    const before = JSON.stringify(await stateOf());
    for (let killAfterMs = FIRST_KILL_MS; ; killAfterMs *= 4) {
      // What answers is loaded, so that the kill meets the step itself.
      await who.ask(path);
      const taking = who.post(path, body).catch(() => 'cut');
      await pause(killAfterMs);
      await server.end('SIGKILL');
      await taking;
      await server.begin();
      const found = await stateOf();
      if (isDone(found)) return found;
      expect(JSON.stringify(found), `left of a step after ${killAfterMs} ms`).toBe(before);
    }
  }
  const frozen = async () =>
    (await author.get<{ frozen: { sha256: string } | null }>(`runs/${run}/freeze`)).frozen;
  const releases = async () =>
    (await owner.get<{ releases: ReleaseView[] }>('releases')).releases.filter(
      (one) => one.title === title,
    );
  /** What anybody sees: its page and its files are there together or not at all. */
  const published = async (code: string) => {
    const page = await fetch(`${server.address}/r/${code}`);
    return { state: (await releases())[0].state, status: page.status };
  };

  await killUntilDone(
    author,
    [`runs/${run}/freeze`, { reason: title }],
    frozen,
    (state) => state !== null,
  );
  const [draft] = await killUntilDone(
    author,
    ['releases', { title, authors: [{ name: 'Nobody' }], runIds: [run] }],
    releases,
    (all) => all.length > 0,
  );
  await statistician.post(`releases/${draft.id}/sign-off`, {});
  await owner.post(`releases/${draft.id}/agree`, {});
  await expect.poll(async () => (await releases())[0].state, { timeout: 60_000 }).toBe('checked');
  const end = await killUntilDone(
    owner,
    [`releases/${draft.id}/publish`, {}],
    () => published(draft.code),
    ({ state }) => state === 'published',
  );
  expect(await releases()).toHaveLength(1);
  expect(end.status).toBe(200);
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
