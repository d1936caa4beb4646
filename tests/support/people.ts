import { randomUUID } from 'node:crypto';
import { encode } from 'next-auth/jwt';
import { type Actor, actorIn, EVERY_SCOPE, type Scope } from '@/lib/access/actor';
import { beginSession, sessionCookieName } from '@/lib/access/sessions';
import { hashToken, makeToken } from '@/lib/access/tokens';
import { config } from '@/lib/config';
import type { Role } from '@/lib/schemas/common';
import {
  AccessTokenRow,
  CollaborationRow,
  database,
  inTransaction,
  MemberRow,
  PersonRow,
} from '@/models';

/** The address that requests of tests are sent to; a real origin, since cookies are checked by it. */
export const webAddress = () => new URL(config().webAddress).origin;

export interface TestPerson {
  id: string;
  name: string;
  email: string;
}

/** A person whose password nobody knows; sign-in tests sign up with one of their own. */
export async function createPerson(given: Partial<TestPerson> = {}): Promise<TestPerson> {
  database();
  const short = randomUUID().slice(0, 8);
  const row = await PersonRow.create({
    name: given.name ?? `Person ${short}`,
    email: given.email ?? `${short}@observatory.example`,
    passwordHash: 'no password',
  });
  return { id: row.id, name: row.name, email: row.email };
}

export interface TestCollaboration {
  id: string;
  slug: string;
  name: string;
}

export async function createCollaboration(
  given: Partial<Pick<TestCollaboration, 'slug' | 'name'>> = {},
): Promise<TestCollaboration> {
  database();
  const slug = given.slug ?? `team-${randomUUID().slice(0, 8)}`;
  const row = await CollaborationRow.create({ slug, name: given.name ?? `Team ${slug}` });
  return { id: row.id, slug: row.slug, name: row.name };
}

export async function addMember(
  collaboration: Pick<TestCollaboration, 'id'>,
  person: Pick<TestPerson, 'id'>,
  roles: Role[],
): Promise<string> {
  const row = await MemberRow.create({
    collaborationId: collaboration.id,
    personId: person.id,
    roles,
  });
  return row.id;
}

/** A collaboration with one new member per entry; several roles are joined by "+". */
export async function createCollaborationWith<Key extends string>(
  members: readonly Key[],
  given: Partial<Pick<TestCollaboration, 'slug' | 'name'>> = {},
): Promise<{
  collaboration: TestCollaboration;
  people: Record<Key, TestPerson>;
  memberIds: Record<Key, string>;
}> {
  const collaboration = await createCollaboration(given);
  const people = {} as Record<Key, TestPerson>;
  const memberIds = {} as Record<Key, string>;
  for (const key of members) {
    people[key] = await createPerson();
    memberIds[key] = await addMember(collaboration, people[key], key.split('+') as Role[]);
  }
  return { collaboration, people, memberIds };
}

/** The person as the services see them, in a collaboration of which they are a member. */
export function actorOf(
  person: TestPerson,
  collaboration: Pick<TestCollaboration, 'slug'>,
): Promise<Actor> {
  return actorIn(
    {
      personId: person.id,
      personName: person.name,
      email: person.email,
      via: 'session',
      scopes: [...EVERY_SCOPE],
    },
    collaboration.slug,
  );
}

/** Text of a token of the person in the collaboration. */
export async function tokenOf(
  person: Pick<TestPerson, 'id'>,
  collaboration: Pick<TestCollaboration, 'id'>,
  scopes: Scope[] = [...EVERY_SCOPE],
  expiresAt: Date = new Date(Date.now() + 86_400_000),
): Promise<string> {
  const token = makeToken();
  await AccessTokenRow.create({
    collaborationId: collaboration.id,
    personId: person.id,
    name: 'for a test',
    scopes,
    tokenHash: hashToken(token),
    ending: token.slice(-4),
    expiresAt,
  });
  return token;
}

export const bearer = (token: string) => ({ authorization: `Bearer ${token}` });

/** A session of the person and the cookie that carries it, as after sign-in. */
export async function sessionCookieOf(
  person: Pick<TestPerson, 'id'>,
): Promise<{ sessionId: string; cookie: string }> {
  const sessionId = await inTransaction((transaction) =>
    beginSession(person.id, 'a test', transaction),
  );
  const token = await encode({
    token: { sub: person.id, sid: sessionId },
    secret: config().authSecret,
  });
  return { sessionId, cookie: `${sessionCookieName()}=${token}` };
}

type Handler = (
  request: Request,
  context: { params: Promise<Record<string, string>> },
) => Promise<Response>;

export interface Call {
  method?: string;
  /** With its query. */
  path?: string;
  params?: Record<string, string>;
  headers?: Record<string, string>;
  /** Sent as JSON, with its content type unless the headers say another. */
  body?: unknown;
}

/** Calls a route handler as the server would. */
export function call(handler: Handler, given: Call = {}): Promise<Response> {
  const headers = new Headers(given.headers);
  if (given.body !== undefined && !headers.has('content-type')) {
    headers.set('content-type', 'application/json');
  }
  const request = new Request(new URL(given.path ?? '/', webAddress()), {
    method: given.method ?? 'GET',
    headers,
    body: given.body === undefined ? undefined : JSON.stringify(given.body),
  });
  return handler(request, { params: Promise.resolve(given.params ?? {}) });
}
