import { afterAll, describe, expect, it, vi } from 'vitest';
import { POST as suspend } from '@/app/api/v1/collaborations/[collaboration]/members/[member]/suspension/route';
import { GET as listMembers } from '@/app/api/v1/collaborations/[collaboration]/members/route';
import { GET as getMe } from '@/app/api/v1/me/route';
import { queueMessage } from '@/lib/mail/outbox';
import { sendDue } from '@/lib/mail/post';
import type { MemberView } from '@/lib/schemas/people';
import { inTransaction } from '@/models';
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

// Nobody listens there: a message that is tried stays waiting, one that is taken back does not.
vi.stubEnv('MAIL_URL', 'smtp://127.0.0.1:9');
afterAll(() => vi.unstubAllEnvs());
const { query } = withDatabase();

async function newTeam() {
  const team = await createCollaborationWith(['owner', 'student']);
  const params = { collaboration: team.collaboration.slug };
  const asOwner = bearer(await tokenOf(team.people.owner, team.collaboration));
  const set = (member: string, isSuspended: boolean, headers: Record<string, string> = asOwner) =>
    call(suspend, {
      method: 'POST',
      params: { ...params, member },
      headers,
      body: { isSuspended },
    });
  return { ...team, params, asOwner, set };
}

describe('suspending a member', () => {
  it('ends their access at once, by session and token, keeps everything, and can be taken back', async () => {
    const { people, memberIds, collaboration, params, asOwner, set } = await newTeam();
    const { cookie } = await sessionCookieOf(people.student);
    const ways = [bearer(await tokenOf(people.student, collaboration)), { cookie }];
    const statuses = () =>
      Promise.all(
        ways.map(async (headers) => (await call(listMembers, { params, headers })).status),
      );
    const places = async () =>
      (await (await call(getMe, { headers: { cookie } })).json()).collaborations;
    expect(await statuses()).toEqual([200, 200]);

    const answer = await set(memberIds.student, true);
    expect(answer.status).toBe(200);
    const view = (await answer.json()) as MemberView;
    expect(view).toMatchObject({ roles: ['student'], can: { suspend: true } });
    expect(Date.parse(view.suspendedAt ?? '')).toBeLessThanOrEqual(Date.now());
    // The collaboration does not exist for them any more; their own account does.
    expect(await statuses()).toEqual([401, 404]);
    expect(await places()).toEqual([]);
    const listed = await (await call(listMembers, { params, headers: asOwner })).json();
    expect(listed.members).toHaveLength(2);

    expect((await set(memberIds.student, true)).status).toBe(200);
    expect((await set(memberIds.student, false)).status).toBe(200);
    expect(await statuses()).toEqual([200, 200]);
    expect(await places()).toHaveLength(1);
    const log = await query<{ action: string }>(
      "select action from audit_entry where collaboration_id = $1 and action like '%-member' order by id",
      [collaboration.id],
    );
    expect(log.map(({ action }) => action)).toEqual(['suspend-member', 'resume-member']);
  });

  it('leaves their other collaborations alone, and sends no mail of this one', async () => {
    const [team, other] = [await newTeam(), await newTeam()];
    const person = team.people.student;
    await addMember(other.collaboration, person, ['author']);
    const elsewhere = bearer(await tokenOf(person, other.collaboration));
    await inTransaction((transaction) =>
      queueMessage(
        transaction,
        'mention',
        { personId: person.id },
        { collaboration: 'Heron', who: 'R. Castellan', item: 'A-31', path: '/heron/analyses/A-31' },
        { collaborationId: team.collaboration.id },
      ),
    );
    await team.set(team.memberIds.student, true);
    const there = await call(listMembers, { params: other.params, headers: elsewhere });
    expect(there.status).toBe(200);
    await sendDue();
    const [{ state }] = await query<{ state: string }>(
      'select state from outbox_message where person_id = $1',
      [person.id],
    );
    expect(state).toBe('withdrawn');
  });

  it('is no way to end one’s own access, nor to leave a collaboration without an owner', async () => {
    const { memberIds, collaboration, set } = await newTeam();
    const own = await set(memberIds.owner, true);
    expect([own.status, (await own.json()).code]).toEqual([409, 'own-access']);
    const second = await createPerson();
    const secondId = await addMember(collaboration, second, ['owner']);
    const asSecond = bearer(await tokenOf(second, collaboration));
    const answers = await Promise.all([set(secondId, true), set(memberIds.owner, true, asSecond)]);
    const left = await query(
      "select 1 from member where collaboration_id = $1 and suspended_at is null and 'owner' = any(roles)",
      [collaboration.id],
    );
    expect(left).toHaveLength(1);
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
  });

  it('is not found for a member of another collaboration, and needs the same page', async () => {
    const [team, other] = [await newTeam(), await newTeam()];
    expect((await team.set(other.memberIds.student, true)).status).toBe(404);
    expect((await team.set('not-an-id', true)).status).toBe(404);
    const { cookie } = await sessionCookieOf(team.people.owner);
    const foreign = { cookie, origin: 'https://elsewhere.example' };
    expect((await team.set(team.memberIds.student, true, foreign)).status).toBe(403);
    const ours = { cookie, origin: webAddress() };
    expect((await team.set(team.memberIds.student, true, ours)).status).toBe(200);
  });
});
