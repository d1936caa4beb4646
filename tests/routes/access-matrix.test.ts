import { afterAll, describe, expect, it, vi } from 'vitest';
import { startMailbox } from '../support/mailbox';

const mailbox = await startMailbox();
vi.stubEnv('MAIL_URL', mailbox.url);

const { GET: getOne, PATCH: rename } = await import(
  '@/app/api/v1/collaborations/[collaboration]/route'
);
const members = await import('@/app/api/v1/collaborations/[collaboration]/members/route');
const member = await import('@/app/api/v1/collaborations/[collaboration]/members/[member]/route');
const suspension = await import(
  '@/app/api/v1/collaborations/[collaboration]/members/[member]/suspension/route'
);
const invitations = await import('@/app/api/v1/collaborations/[collaboration]/invitations/route');
const invitation = await import(
  '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/route'
);
const resend = await import(
  '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/resend/route'
);
const tokens = await import('@/app/api/v1/collaborations/[collaboration]/tokens/route');
const oneToken = await import('@/app/api/v1/collaborations/[collaboration]/tokens/[token]/route');
const audit = await import('@/app/api/v1/collaborations/[collaboration]/audit/route');
const populations = await import('@/app/api/v1/collaborations/[collaboration]/populations/route');
const population = await import(
  '@/app/api/v1/collaborations/[collaboration]/populations/[population]/route'
);
const versions = await import(
  '@/app/api/v1/collaborations/[collaboration]/populations/[population]/versions/route'
);
const { describePermissions } = await import('../support/permission-matrix');
const { roleSchema } = await import('@/lib/schemas/common');
const { withDatabase } = await import('../support/database');
const support = await import('../support/people');
const { addMember, bearer, call, createPerson, sessionCookieOf, tokenOf, webAddress } = support;

type Cell = import('../support/permission-matrix').Cell;
type Team = import('../support/permission-matrix').Team;

const { query } = withDatabase();
const roles = roleSchema.options;

const definition = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  massIndex: -1.3,
  semiMajorAxisIndex: -0.6,
};
const populationBody = { name: 'Cold giants', convention: 'linear', definition };

let serial = 0;
const newAddress = () => `guest-${++serial}@observatory.example`;

async function newMember(team: Team): Promise<string> {
  return addMember(team.collaboration, await createPerson(), ['student']);
}
async function newInvitation(team: Team): Promise<string> {
  const [row] = await query<{ id: string }>(
    `insert into invitation (collaboration_id, email, roles, code_hash, expires_at)
     values ($1, $2, '{student}', $2, now() + interval '1 day') returning id`,
    [team.collaboration.id, newAddress()],
  );
  return row.id;
}
async function newPopulation(team: Team, madeBy: string, isShared: boolean): Promise<string> {
  const number = ++serial + 1000;
  await query(
    `insert into population (collaboration_id, number, version, name, definition, digest, is_shared, created_by)
     values ($1, $2, 1, 'Cold giants', $3, 'digest', $4, $5)`,
    [team.collaboration.id, number, JSON.stringify(definition), isShared, madeBy],
  );
  return `P-${number}`;
}

const cells: Cell[] = [
  {
    name: 'the collaboration',
    handler: getOne,
    method: 'GET',
    action: 'read',
    scope: 'read',
    success: 200,
  },
  {
    name: 'the collaboration',
    handler: rename,
    method: 'PATCH',
    action: 'manage-collaboration',
    scope: 'write',
    success: 200,
    prepare: async () => ({ body: { name: 'Another name' } }),
  },
  {
    name: 'members',
    handler: members.GET,
    method: 'GET',
    action: 'read',
    scope: 'read',
    success: 200,
  },
  {
    name: 'roles of a member',
    handler: member.PATCH,
    method: 'PATCH',
    action: 'change-roles',
    scope: 'write',
    success: 200,
    prepare: async (team) => ({
      params: { member: await newMember(team) },
      body: { roles: ['author'] },
    }),
  },
  {
    name: 'suspension of a member',
    handler: suspension.POST,
    method: 'POST',
    action: 'change-roles',
    scope: 'write',
    success: 200,
    prepare: async (team) => ({
      params: { member: await newMember(team) },
      body: { isSuspended: true },
    }),
  },
  {
    name: 'a member',
    handler: member.DELETE,
    method: 'DELETE',
    action: 'change-roles',
    scope: 'write',
    success: 204,
    prepare: async (team) => ({ params: { member: await newMember(team) } }),
  },
  {
    name: 'invitations',
    handler: invitations.GET,
    method: 'GET',
    action: 'invite',
    scope: 'read',
    success: 200,
  },
  {
    name: 'an invitation of a student',
    handler: invitations.POST,
    method: 'POST',
    action: 'invite',
    scope: 'write',
    success: 201,
    prepare: async () => ({ body: { email: newAddress(), roles: ['student'] } }),
  },
  {
    name: 'an invitation of an author',
    handler: invitations.POST,
    method: 'POST',
    action: 'invite-any-role',
    scope: 'write',
    success: 201,
    prepare: async () => ({ body: { email: newAddress(), roles: ['author'] } }),
  },
  {
    name: 'a student’s invitation, again',
    handler: resend.POST,
    method: 'POST',
    action: 'invite',
    scope: 'write',
    success: 200,
    prepare: async (team) => ({ params: { invitation: await newInvitation(team) } }),
  },
  {
    name: 'a student’s invitation',
    handler: invitation.DELETE,
    method: 'DELETE',
    action: 'invite',
    scope: 'write',
    success: 204,
    prepare: async (team) => ({ params: { invitation: await newInvitation(team) } }),
  },
  {
    name: 'own tokens',
    handler: tokens.GET,
    method: 'GET',
    action: 'create-token',
    scope: 'read',
    success: 200,
  },
  {
    name: 'a token of one’s own',
    handler: oneToken.DELETE,
    method: 'DELETE',
    action: 'create-token',
    scope: 'write',
    success: 204,
    prepare: async (team, personId) => {
      await tokenOf({ id: personId }, team.collaboration);
      const [row] = await query<{ id: string }>(
        `select id from access_token where person_id = $1 and collaboration_id = $2
          order by created_at desc limit 1`,
        [personId, team.collaboration.id],
      );
      return { params: { token: row.id } };
    },
  },
  {
    name: 'the log',
    handler: audit.GET,
    method: 'GET',
    action: 'read-audit',
    scope: 'read',
    success: 200,
  },
  {
    name: 'populations',
    handler: populations.GET,
    method: 'GET',
    action: 'read',
    scope: 'read',
    success: 200,
  },
  {
    name: 'a population of one’s own',
    handler: populations.POST,
    method: 'POST',
    action: 'save-population',
    standing: { isOwn: true },
    scope: 'write',
    success: 201,
    prepare: async () => ({ body: populationBody }),
  },
  {
    name: 'a population for all',
    handler: populations.POST,
    method: 'POST',
    action: 'share-population',
    scope: 'write',
    success: 201,
    prepare: async () => ({ body: { ...populationBody, isShared: true } }),
  },
  {
    name: 'one population',
    handler: population.GET,
    method: 'GET',
    action: 'read',
    scope: 'read',
    success: 200,
    prepare: async (team, personId) => ({
      params: { population: await newPopulation(team, personId, false) },
    }),
  },
  {
    name: 'a population shared with all',
    handler: population.PATCH,
    method: 'PATCH',
    action: 'share-population',
    scope: 'write',
    success: 200,
    prepare: async (team, personId) => ({
      params: { population: await newPopulation(team, personId, false) },
      body: { isShared: true },
    }),
  },
  {
    name: 'a version of one’s own draft',
    handler: versions.POST,
    method: 'POST',
    action: 'save-population',
    standing: { isOwn: true },
    scope: 'write',
    success: 201,
    prepare: async (team, personId) => ({
      params: { population: await newPopulation(team, personId, false) },
      body: { convention: 'log', definition },
    }),
  },
  {
    name: 'a version of somebody else’s draft',
    handler: versions.POST,
    method: 'POST',
    action: 'save-population',
    scope: 'write',
    success: 201,
    prepare: async (team) => ({
      params: { population: await newPopulation(team, (await createPerson()).id, false) },
      body: { convention: 'log', definition },
    }),
  },
];

afterAll(async () => {
  await mailbox.stop();
  vi.unstubAllEnvs();
});

describePermissions(cells);

describe('making tokens', () => {
  it.each(roles)('is open to the %s, but never through a token', async (role) => {
    const team = await support.createCollaborationWith([role]);
    const person = team.people[role];
    const params = { collaboration: team.collaboration.slug };
    const body = { name: 'a script', scopes: ['read'] };
    const { cookie } = await sessionCookieOf(person);
    const headers = { cookie, origin: webAddress() };
    expect((await call(tokens.POST, { method: 'POST', params, headers, body })).status).toBe(201);
    const token = bearer(await tokenOf(person, team.collaboration));
    const refused = await call(tokens.POST, { method: 'POST', params, headers: token, body });
    expect(refused.status).toBe(403);
  });
});
