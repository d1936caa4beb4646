import { describe, expect, it } from 'vitest';
import { DELETE as revoke } from '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { withDatabase } from '../support/database';
import { openInvitations } from '../support/invitations';
import { call, createPerson, sessionCookieOf, webAddress } from '../support/people';

const { query } = withDatabase();
const PASSWORD = 'violet harbour anchor mosaic';
const { team, invited, onInvitation, offerOf, joinWith } = await openInvitations();

describe('GET /api/v1/join/{code}', () => {
  it('says who invites, to what, as what', async () => {
    const { email, code } = await invited(['author']);
    expect(await (await offerOf(code)).json()).toEqual({
      collaboration: team.collaboration.name,
      slug: team.collaboration.slug,
      email,
      roles: ['author'],
      invitedBy: team.people.owner.name,
      hasAccount: false,
    });
  });

  it('does not tell a made-up code from one that was used, revoked or has expired', async () => {
    const used = await invited();
    await joinWith(used.code, { name: 'Mira Okafor', password: PASSWORD });
    const expired = await invited();
    await query('update invitation set expires_at = now() where email = $1', [expired.email]);
    const revoked = await invited();
    const [{ id }] = await query<{ id: string }>('select id from invitation where email = $1', [
      revoked.email,
    ]);
    expect((await onInvitation(revoke, 'DELETE', id)).status).toBe(204);
    const bodies = new Set<string>();
    for (const code of [used.code, expired.code, revoked.code, 'made-up']) {
      const offer = await offerOf(code);
      const joined = await joinWith(code, { name: 'Mira Okafor', password: PASSWORD });
      expect([offer.status, joined.status]).toEqual([404, 404]);
      bodies.add(await offer.text()).add(await joined.text());
    }
    expect(bodies.size).toBe(1);
  });
});

describe('POST /api/v1/join/{code}', () => {
  it('makes an account for the invited address and a member with the roles', async () => {
    const { email, code } = await invited(['author', 'student']);
    const response = await joinWith(code, { name: 'Mira Okafor', password: PASSWORD });
    expect(response.status).toBe(201);
    expect(await response.json()).toEqual({
      slug: team.collaboration.slug,
      email,
      isNewAccount: true,
    });
    const rows = await query(
      `select m.roles, p.name from member m join person p on p.id = m.person_id
        where p.email = $1 and m.collaboration_id = $2`,
      [email, team.collaboration.id],
    );
    expect(rows).toEqual([{ roles: ['author', 'student'], name: 'Mira Okafor' }]);
  });

  it('asks a new person for name and password', async () => {
    const { code } = await invited();
    const response = await joinWith(code, {});
    expect(response.status).toBe(422);
    expect((await response.json()).errors).toMatchObject([
      { code: 'value-missing', item: 'name' },
      { code: 'value-missing', item: 'password' },
    ]);
    const weak = await joinWith(code, { name: 'Mira Okafor', password: 'passwordpassword' });
    expect((await weak.json()).errors[0].code).toBe('password-guessable');
    expect((await offerOf(code)).status).toBe(200);
  });

  it('lets no caller choose roles or address', async () => {
    const { code } = await invited();
    const body = { name: 'M', password: PASSWORD, roles: ['owner'], email: 'x@y.example' };
    const response = await joinWith(code, body);
    expect(response.status).toBe(400);
    expect((await offerOf(code)).status).toBe(200);
  });

  it('takes the person who is signed in with the invited address', async () => {
    const { email, code } = await invited(['collaborator']);
    const person = await createPerson({ email });
    expect((await (await offerOf(code)).json()).hasAccount).toBe(true);
    const { cookie } = await sessionCookieOf(person);
    const headers = { cookie, origin: webAddress() };
    expect((await joinWith(code, {}, headers)).status).toBe(201);
    const me = await (await call(getMe, { headers: { cookie } })).json();
    expect(me.collaborations).toEqual([
      { slug: team.collaboration.slug, name: team.collaboration.name, roles: ['collaborator'] },
    ]);
  });

  it('refuses a person who is signed in with another address', async () => {
    const { code } = await invited();
    const { cookie } = await sessionCookieOf(await createPerson());
    const response = await joinWith(code, {}, { cookie, origin: webAddress() });
    expect(response.status).toBe(403);
    expect((await offerOf(code)).status).toBe(200);
  });

  it('takes over no account: who has one signs in first', async () => {
    const { email, code } = await invited();
    await createPerson({ email });
    const response = await joinWith(code, { name: 'Thief', password: PASSWORD });
    expect(response.status).toBe(401);
    expect((await offerOf(code)).status).toBe(200);
  });

  it('refuses a page of another site that uses our cookie', async () => {
    const { email, code } = await invited();
    const { cookie } = await sessionCookieOf(await createPerson({ email }));
    const response = await joinWith(code, {}, { cookie, origin: 'https://elsewhere.example' });
    expect(response.status).toBe(403);
    expect(await response.json()).toMatchObject({ code: 'cross-site' });
  });

  it('works once, also when it is sent twice at the same moment', async () => {
    const { email, code } = await invited();
    const answers = await Promise.all([
      joinWith(code, { name: 'Mira Okafor', password: PASSWORD }),
      joinWith(code, { name: 'Mira Okafor', password: PASSWORD }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 404]);
    expect(await query('select 1 as n from person where email = $1', [email])).toHaveLength(1);
  });
});
