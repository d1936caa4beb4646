import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  DELETE as giveUp,
  GET as howMuch,
  PATCH as sendPart,
} from '@/app/api/v1/collaborations/[collaboration]/unfinished-files/[unfinished]/route';
import { POST as begin } from '@/app/api/v1/collaborations/[collaboration]/unfinished-files/route';
import { POST as readUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/route';
import type { RouteHandler } from '@/app/api/v1/handler';
import { closeReaders } from '@/lib/services/reading';
import { withDatabase } from '../support/database';
import { bearer, createCollaborationWith, tokenOf, webAddress } from '../support/people';
import { buildSurvey } from '../support/sample';

withDatabase();

const PART = { 'content-type': 'application/offset+octet-stream', 'tus-resumable': '1.0.0' };
const text = 'name,distance,age\nFirst star,12,30\nSecond star,30,120\n';
const bytes = new TextEncoder().encode(text);

let slug = '';
let survey = '';
let owner: Record<string, string>;
let second: Record<string, string>;
let student: Record<string, string>;
let stranger: Record<string, string>;

beforeAll(async () => {
  const { collaboration, people } = await createCollaborationWith([
    'owner',
    'collaborator',
    'student',
  ]);
  const other = await createCollaborationWith(['owner']);
  slug = collaboration.slug;
  survey = (await buildSurvey(collaboration.id, { leadId: people.collaborator.id })).slug;
  owner = bearer(await tokenOf(people.owner, collaboration));
  second = bearer(await tokenOf(people.collaborator, collaboration));
  student = bearer(await tokenOf(people.student, collaboration));
  stranger = bearer(await tokenOf(other.people.owner, other.collaboration));
});
afterAll(closeReaders);

interface Sending {
  query?: Record<string, string>;
  method?: string;
  id?: string;
  who?: Record<string, string>;
  headers?: Record<string, string>;
  body?: BodyInit;
}

function ask(
  handler: RouteHandler,
  { query, method = 'POST', id, who = owner, headers, body }: Sending = {},
): Promise<Response> {
  const address = new URL(`/?${new URLSearchParams(query)}`, webAddress());
  const asked = { method, headers: { ...who, ...headers }, body, duplex: 'half' };
  const params: Record<string, string> = { collaboration: slug };
  if (id !== undefined) params.unfinished = id;
  return handler(new Request(address, asked as RequestInit), { params: Promise.resolve(params) });
}

const beginning = (byteLength: number | string, who = owner) =>
  ask(begin, {
    query: { kind: 'targets', survey },
    who,
    headers: { 'upload-length': String(byteLength) },
  });
const part = (id: string, offset: number, body: BodyInit, more: Sending = {}) =>
  ask(sendPart, {
    method: 'PATCH',
    id,
    body,
    headers: { ...PART, 'upload-offset': String(offset) },
    ...more,
  });
const offsetOf = async (id: string) =>
  (await ask(howMuch, { method: 'GET', id })).headers.get('upload-offset');
const reading = (id: string, more: Record<string, string> = {}) =>
  ask(readUpload, { query: { kind: 'targets', survey, name: 'a.csv', unfinished: id, ...more } });

describe('a file that comes in parts', () => {
  it('goes on where a broken connection left it, and is read once it is whole', async () => {
    const begun = await beginning(bytes.length);
    expect(begun.status).toBe(201);
    const { id } = await begun.json();
    expect(begun.headers.get('location')).toMatch(new RegExp(`/${id}$`));
    const cut = new ReadableStream({
      start(stream) {
        stream.enqueue(bytes.slice(0, 20));
        setTimeout(() => stream.error(new Error('reset')), 50);
      },
    });
    expect((await part(id, 0, cut)).status).toBe(400);
    expect(await offsetOf(id)).toBe('20');
    expect((await reading(id)).status).toBe(409);
    expect((await part(id, 0, bytes)).status).toBe(409);
    expect((await part(id, 20, `${text.slice(20)}more`)).status).toBe(413);
    const stands = Number(await offsetOf(id));
    const rest = await part(id, stands, bytes.slice(stands));
    expect([rest.status, rest.headers.get('upload-offset')]).toEqual([204, String(bytes.length)]);
    const read = await reading(id);
    expect(read.status, await read.clone().text()).toBe(201);
    const digest = Buffer.from(await crypto.subtle.digest('SHA-256', bytes)).toString('hex');
    expect(await read.json()).toMatchObject({ sha256: digest, byteLength: bytes.length });
    expect((await ask(howMuch, { method: 'GET', id })).status).toBe(404);
  });

  it('stays where it is refused, to be read with other settings', async () => {
    const odd = 'star label,distance,age\nThird star,12,30\n';
    const { id } = await (await beginning(odd.length)).json();
    await part(id, 0, odd);
    expect((await reading(id)).status).toBe(422);
    const settings = JSON.stringify({ columnMap: { 'star label': 'name' } });
    expect((await reading(id, { settings })).status).toBe(201);
  });

  it('takes the newer of two senders, and ends the older', async () => {
    const { id } = await (await beginning(bytes.length)).json();
    const hanging = new ReadableStream({ start: (stream) => stream.enqueue(bytes.slice(0, 5)) });
    const older = part(id, 0, hanging);
    while ((await offsetOf(id)) !== '5') await new Promise((next) => setTimeout(next, 10));
    expect((await part(id, 5, bytes.slice(5))).status).toBe(204);
    expect((await older).status).toBe(400);
    expect(await offsetOf(id)).toBe(String(bytes.length));
  });

  it('belongs to who began it, in this collaboration', async () => {
    const { id } = await (await beginning(9)).json();
    for (const who of [second, student, stranger]) {
      expect((await ask(howMuch, { method: 'GET', id, who })).status).toBe(404);
      expect((await part(id, 0, 'name', { who, headers: PART })).status).toBe(
        who === stranger ? 404 : 400,
      );
      expect((await ask(giveUp, { method: 'DELETE', id, who })).status).toBe(404);
    }
    expect((await part(id, 0, 'name', { who: second })).status).toBe(404);
    expect((await ask(giveUp, { method: 'DELETE', id })).status).toBe(204);
    expect((await ask(howMuch, { method: 'GET', id })).status).toBe(404);
  });

  it('is refused before it is sent: no right, no length, too long, too many', async () => {
    expect((await beginning(9, student)).status).toBe(403);
    expect((await ask(begin, { query: { kind: 'targets', survey } })).status).toBe(400);
    expect((await beginning('-1')).status).toBe(400);
    expect((await beginning(2 ** 40)).status).toBe(413);
    const headers = { 'upload-length': '9', 'tus-resumable': '0.2.2' };
    expect((await ask(begin, { query: { kind: 'targets', survey }, headers })).status).toBe(412);
    const statuses: number[] = [];
    for (let i = 0; i < 9; i++) statuses.push((await beginning(9, second)).status);
    expect(statuses).toEqual([...Array(8).fill(201), 409]);
  });
});
