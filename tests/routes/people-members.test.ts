import { Client } from 'pg';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import {
  PATCH as changeRoles,
  DELETE as removeMember,
} from '@/app/api/v1/collaborations/[collaboration]/members/[member]/route';
import { GET as listMembers } from '@/app/api/v1/collaborations/[collaboration]/members/route';
import { DELETE as revokeToken } from '@/app/api/v1/collaborations/[collaboration]/tokens/[token]/route';
import { POST as createToken } from '@/app/api/v1/collaborations/[collaboration]/tokens/route';
import {
  POST as createCollaboration,
  GET as listCollaborations,
} from '@/app/api/v1/collaborations/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import type { Role } from '@/lib/schemas/common';
import { withDatabase } from '../support/database';
import {
  addMember,
  bearer,
  call,
  createCollaborationWith,
  createPerson,
  sessionCookieOf,
  tokenOf,
  webAddress,
} from '../support/people';

const { query, url } = withDatabase();

/** Lets the requests of `start` meet at the collaboration's members, then go on together. */
async function atOnce<T>(collaborationId: string, start: () => Promise<T>[]): Promise<T[]> {
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    await client.query('begin');
    await client.query('select id from member where collaboration_id = $1 for update', [
      collaborationId,
    ]);
    const answers = start();
    await vi.waitFor(
      async () => {
        const waiting = await query(
          "select 1 from pg_stat_activity where datname = current_database() and wait_event_type = 'Lock'",
        );
        if (waiting.length < answers.length) throw new Error('not all are waiting yet');
      },
      { timeout: 10_000 },
    );
    await client.query('commit');
    return await Promise.all(answers);
  } finally {
    await client.end();
  }
}

beforeEach(async () => {
  await query('delete from rate_limit');
});

async function newTeam() {
  const team = await createCollaborationWith(['owner', 'student', 'collaborator']);
  const { cookie } = await sessionCookieOf(team.people.owner);
  const headers = { cookie, origin: webAddress() };
  const params = { collaboration: team.collaboration.slug };
  return {
    ...team,
    headers,
    params,
    members: async () =>
      (await (await call(listMembers, { params, headers })).json()).members as {
        id: string;
        person: { id: string };
        roles: Role[];
        leads: string[];
        can: { changeRoles: boolean; remove: boolean };
      }[],
    change: (member: string, roles: Role[], as: Record<string, string> = headers) =>
      call(changeRoles, {
        method: 'PATCH',
        params: { ...params, member },
        headers: as,
        body: { roles },
      }),
    remove: (member: string, as: Record<string, string> = headers) =>
      call(removeMember, { method: 'DELETE', params: { ...params, member }, headers: as }),
  };
}

describe('POST /api/v1/collaborations', () => {
  it('makes the person its owner', async () => {
    const person = await createPerson();
    const { cookie } = await sessionCookieOf(person);
    const headers = { cookie, origin: webAddress() };
    const body = { name: 'Heron Survey', slug: 'heron' };
    const response = await call(createCollaboration, { method: 'POST', headers, body });
    expect(response.status).toBe(201);
    expect(await response.json()).toMatchObject({ ...body, can: { manage: true, invite: true } });
    const listed = await call(listCollaborations, { headers: { cookie } });
    expect(await listed.json()).toEqual({ collaborations: [{ ...body, roles: ['owner'] }] });
  });

  it('says the same of an address that is taken and of one that is reserved', async () => {
    const { collaboration } = await createCollaborationWith(['owner']);
    const { cookie } = await sessionCookieOf(await createPerson());
    const headers = { cookie, origin: webAddress() };
    const bodies = await Promise.all(
      [collaboration.slug, 'sign-in', 'api'].map(async (slug) => {
        const body = { name: 'Mine', slug };
        const response = await call(createCollaboration, { method: 'POST', headers, body });
        expect(response.status).toBe(409);
        return response.text();
      }),
    );
    expect(new Set(bodies).size).toBe(1);
  });

  it('lets two collaborations have one name', async () => {
    const { cookie } = await sessionCookieOf(await createPerson());
    const headers = { cookie, origin: webAddress() };
    for (const slug of ['twin-a', 'twin-b']) {
      const body = { name: 'Twins', slug };
      expect((await call(createCollaboration, { method: 'POST', headers, body })).status).toBe(201);
    }
  });
});

describe('GET …/members', () => {
  it('shows roles, surveys that each leads, and what may be done', async () => {
    const team = await newTeam();
    await query(
      `insert into survey (collaboration_id, slug, name, band, lead_id, map_settings)
       values ($1, 'heron', 'Heron North', 'K', $2, '{}')`,
      [team.collaboration.id, team.people.collaborator.id],
    );
    const members = await team.members();
    expect(members).toHaveLength(3);
    const of = (role: 'owner' | 'student' | 'collaborator') =>
      members.find(({ id }) => id === team.memberIds[role]);
    expect(of('collaborator')).toMatchObject({ roles: ['collaborator'], leads: ['Heron North'] });
    expect(of('owner')?.can).toEqual({ changeRoles: true, remove: false, suspend: false });
    expect(of('student')?.can).toEqual({ changeRoles: true, remove: true, suspend: true });
  });

  it('offers a student nothing but to leave', async () => {
    const team = await newTeam();
    const headers = bearer(await tokenOf(team.people.student, team.collaboration));
    const answer = await (await call(listMembers, { params: team.params, headers })).json();
    for (const { person, can } of answer.members) {
      expect(can).toEqual({
        changeRoles: false,
        remove: person.id === team.people.student.id,
        suspend: false,
      });
    }
  });
});

describe('PATCH …/members/{id}', () => {
  it('holds from the next request on, in both directions', async () => {
    const team = await newTeam();
    const student = bearer(await tokenOf(team.people.student, team.collaboration));
    expect((await team.change(team.memberIds.collaborator, ['author'], student)).status).toBe(403);
    expect((await team.change(team.memberIds.student, ['student', 'owner'])).status).toBe(200);
    expect((await team.change(team.memberIds.collaborator, ['author'], student)).status).toBe(200);
    expect((await team.change(team.memberIds.student, ['student'])).status).toBe(200);
    expect((await team.change(team.memberIds.collaborator, ['student'], student)).status).toBe(403);
  });

  it('keeps the last owner', async () => {
    const team = await newTeam();
    const response = await team.change(team.memberIds.owner, ['author']);
    expect(response.status).toBe(409);
    expect(await response.json()).toMatchObject({ code: 'last-owner' });
    expect((await team.remove(team.memberIds.owner)).status).toBe(409);
  });

  it('keeps one of two owners who step down at the same moment', async () => {
    const team = await newTeam();
    const second = await createPerson();
    const secondId = await addMember(team.collaboration, second, ['owner']);
    const { cookie } = await sessionCookieOf(second);
    const answers = await atOnce(team.collaboration.id, () => [
      team.change(team.memberIds.owner, ['author']),
      team.change(secondId, ['author'], { cookie, origin: webAddress() }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });

  it('needs at least one role, and only roles that there are', async () => {
    const team = await newTeam();
    expect((await team.change(team.memberIds.student, [])).status).toBe(422);
    const response = await team.change(team.memberIds.student, ['emperor' as Role]);
    expect(response.status).toBe(422);
    expect((await response.json()).errors[0]).toMatchObject({
      code: 'choice-unknown',
      item: 'roles.0',
      found: '"emperor"',
    });
  });
});

describe('DELETE …/members/{id}', () => {
  it('ends sessions and tokens of the person here, and keeps what they made', async () => {
    const team = await newTeam();
    const person = team.people.collaborator;
    const token = bearer(await tokenOf(person, team.collaboration));
    const { cookie } = await sessionCookieOf(person);
    await query(
      `insert into population (collaboration_id, number, version, name, definition, digest, created_by)
       values ($1, 1, 1, 'Kept', '{}', 'd', $2)`,
      [team.collaboration.id, person.id],
    );
    expect((await team.remove(team.memberIds.collaborator)).status).toBe(204);
    expect((await call(listMembers, { params: team.params, headers: token })).status).toBe(401);
    expect((await call(getMe, { headers: { cookie } })).status).toBe(401);
    const kept = await query<{ created_by: string }>(
      'select created_by from population where collaboration_id = $1',
      [team.collaboration.id],
    );
    expect(kept).toEqual([{ created_by: person.id }]);
    // A token from before does not come back with the person.
    await addMember(team.collaboration, person, ['student']);
    expect((await call(listMembers, { params: team.params, headers: token })).status).toBe(401);
  });

  it('leaves other collaborations of the person alone', async () => {
    const [team, other] = [await newTeam(), await newTeam()];
    const person = team.people.student;
    await addMember(other.collaboration, person, ['author']);
    const elsewhere = bearer(await tokenOf(person, other.collaboration));
    expect((await team.remove(team.memberIds.student)).status).toBe(204);
    const there = await call(listMembers, { params: other.params, headers: elsewhere });
    expect(there.status).toBe(200);
  });

  it('lets everybody leave, and their other sessions end', async () => {
    const team = await newTeam();
    const [here, there] = [
      await sessionCookieOf(team.people.student),
      await sessionCookieOf(team.people.student),
    ];
    const headers = { cookie: here.cookie, origin: webAddress() };
    expect((await team.remove(team.memberIds.student, headers)).status).toBe(204);
    expect((await call(getMe, { headers: { cookie: here.cookie } })).status).toBe(200);
    expect((await call(getMe, { headers: { cookie: there.cookie } })).status).toBe(401);
    const gone = await call(listMembers, { params: team.params, headers });
    expect(gone.status).toBe(404);
  });
});

describe('access tokens', () => {
  it('are shown once, stored as a hash, and work until they are revoked', async () => {
    const team = await newTeam();
    const made = await call(createToken, {
      method: 'POST',
      params: team.params,
      headers: team.headers,
      body: { name: 'nightly script', scopes: ['read'] },
    });
    expect(made.status).toBe(201);
    const { token, id, ...rest } = await made.json();
    expect(token).toMatch(/^rb_[0-9A-Za-z]{46}$/);
    const days = (Date.parse(rest.expiresAt) - Date.parse(rest.createdAt)) / 86_400_000;
    expect(days).toBeCloseTo(90, 2);
    for (const table of ['access_token', 'audit_entry']) {
      expect(JSON.stringify(await query(`select * from ${table}`))).not.toContain(token);
    }
    const me = await call(getMe, { headers: bearer(token) });
    expect((await me.json()).person.id).toBe(team.people.owner.id);
    const [used] = await query<{ last_used_at: Date | null }>(
      'select last_used_at from access_token where id = $1',
      [id],
    );
    expect(used.last_used_at).not.toBeNull();
    await call(revokeToken, {
      method: 'DELETE',
      params: { ...team.params, token: id },
      headers: team.headers,
    });
    expect((await call(getMe, { headers: bearer(token) })).status).toBe(401);
  });

  it('last a year at most', async () => {
    const team = await newTeam();
    const response = await call(createToken, {
      method: 'POST',
      params: team.params,
      headers: team.headers,
      body: { name: 'for ever', scopes: ['read'], days: 366 },
    });
    expect(response.status).toBe(422);
    expect((await response.json()).errors[0]).toMatchObject({ code: 'out-of-range', item: 'days' });
  });

  it('show only their own collaboration in /me', async () => {
    const [team, other] = [await newTeam(), await newTeam()];
    await addMember(other.collaboration, team.people.owner, ['author']);
    const token = bearer(await tokenOf(team.people.owner, team.collaboration));
    const me = await (await call(getMe, { headers: token })).json();
    expect(me.collaborations.map(({ slug }: { slug: string }) => slug)).toEqual([
      team.collaboration.slug,
    ]);
  });

  it('never do more than the person may by now', async () => {
    const team = await newTeam();
    const second = await createPerson();
    const secondId = await addMember(team.collaboration, second, ['owner']);
    const token = bearer(await tokenOf(second, team.collaboration));
    expect((await team.change(team.memberIds.student, ['author'], token)).status).toBe(200);
    await team.change(secondId, ['student']);
    expect((await team.change(team.memberIds.student, ['owner'], token)).status).toBe(403);
  });

  it('of somebody else cannot be revoked, not even by an owner', async () => {
    const team = await newTeam();
    await tokenOf(team.people.student, team.collaboration);
    const [{ id }] = await query<{ id: string }>(
      'select id from access_token where person_id = $1',
      [team.people.student.id],
    );
    const response = await call(revokeToken, {
      method: 'DELETE',
      params: { ...team.params, token: id },
      headers: team.headers,
    });
    expect(response.status).toBe(404);
  });
});
