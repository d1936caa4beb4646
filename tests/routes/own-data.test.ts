import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { GET as fetchData } from '@/app/api/v1/me/data/route';
import { POST as remove } from '@/app/api/v1/me/deletion/route';
import { GET as who } from '@/app/api/v1/me/route';
import { hashPassword } from '@/lib/access/passwords';
import { NoteRow, SurveyRow } from '@/models';
import { withDatabase } from '../support/database';
import {
  addMember,
  bearer,
  call,
  createCollaborationWith,
  sessionCookieOf,
  tokenOf,
  webAddress,
} from '../support/people';
import { buildSurvey } from '../support/sample';

const { query } = withDatabase();
const PASSWORD = 'herons stand in cold water';
const team = await createCollaborationWith(['owner', 'author'], { name: 'Heron' });
const { owner, author } = team.people;
let token: string;
let signedIn: Record<string, string>;

beforeAll(async () => {
  const hash = await hashPassword(PASSWORD);
  await query('update person set password_hash = $1', [hash]);
  token = await tokenOf(owner, team.collaboration);
  const { cookie } = await sessionCookieOf(owner);
  signedIn = { cookie, origin: webAddress() };
  const survey = await buildSurvey(team.collaboration.id, { leadId: owner.id });
  for (const { id, name } of [owner, author]) {
    await NoteRow.create({
      collaborationId: team.collaboration.id,
      surveyId: survey.id,
      body: `a note of ${name}`,
      createdBy: id,
    } as never);
  }
});
beforeEach(() => query('delete from rate_limit'));

const ask = (password: string, headers = signedIn) =>
  call(remove, { method: 'POST', headers, body: { password } });

describe('what is stored about a person', () => {
  it('is given to a session, whole, without secrets and without other people', async () => {
    expect((await call(fetchData, { headers: bearer(token) })).status).toBe(403);
    const response = await call(fetchData, { headers: signedIn });
    expect(response.headers.get('content-disposition')).toMatch(/^attachment/);
    const text = await response.text();
    const data = JSON.parse(text);
    expect(data.profile).toMatchObject({ id: owner.id, name: owner.name, email: owner.email });
    expect(data.memberships).toMatchObject([{ collaboration: 'Heron', roles: ['owner'] }]);
    expect(data.notes).toHaveLength(1);
    expect(data.tokens).toMatchObject([{ name: 'for a test' }]);
    expect(data.sessions).toMatchObject([{ userAgent: 'a test' }]);
    expect(text).not.toMatch(/password|hash|sealed/i);
    expect(text).not.toContain(author.name);
    const again = JSON.parse(await (await call(fetchData, { headers: signedIn })).text());
    expect(again.log.at(-1)).toMatchObject({ action: 'export', summary: 'fetched their own data' });
  });
});

describe('deleting an account', () => {
  it('wants the password, and an owner in every collaboration', async () => {
    expect((await ask(PASSWORD, bearer(token))).status).toBe(403);
    expect((await ask('herons stand in warm water')).status).toBe(422);
    const refused = await ask(PASSWORD);
    expect(refused.status).toBe(409);
    expect((await refused.json()).detail).toMatch(/^You are the only owner of Heron:/);
    expect((await call(who, { headers: signedIn })).status).toBe(200);
  });

  it('ends every way in and keeps the work, by a former member', async () => {
    await query(`update member set roles = '{owner}' where person_id = $1`, [author.id]);
    expect((await ask(PASSWORD)).status).toBe(204);
    for (const headers of [signedIn, bearer(token)]) {
      expect((await call(who, { headers })).status).toBe(401);
    }
    const [person] = await query('select * from person where id = $1', [owner.id]);
    expect(person).toMatchObject({ name: 'a former member', email: `${owner.id}@former.invalid` });
    expect(person.password_hash).toBe('no password');
    const everywhere = await query<{ n: number }>(
      `select (select count(*) from member where person_id = $1)::int
         + (select count(*) from session where person_id = $1)::int
         + (select count(*) from access_token where person_id = $1)::int
         + (select count(*) from person where email = $2 or name = $3)::int as n`,
      [owner.id, owner.email, owner.name],
    );
    expect(everywhere[0].n).toBe(0);
    expect(await SurveyRow.count({ where: { leadId: owner.id } })).toBe(1);
    expect(await NoteRow.count({ where: { createdBy: owner.id } })).toBe(1);
    const log = await query<{ action: string }>(
      `select action from audit_entry where person_id = $1 order by id desc limit 2`,
      [owner.id],
    );
    expect(log.map(({ action }) => action)).toEqual(['delete-account', 'remove-member']);
  });

  it('leaves the address free for a new account', async () => {
    await expect(addMember(team.collaboration, author, ['owner'])).rejects.toThrow();
    await query(
      `insert into person (email, name, password_hash) values ($1, 'Somebody', 'no password')`,
      [owner.email],
    );
    const rows = await query('select name from person where email = $1', [owner.email]);
    expect(rows).toEqual([{ name: 'Somebody' }]);
  });
});
