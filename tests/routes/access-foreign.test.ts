import { expect, it } from 'vitest';
import * as resend from '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/resend/route';
import * as invitation from '@/app/api/v1/collaborations/[collaboration]/invitations/[invitation]/route';
import * as member from '@/app/api/v1/collaborations/[collaboration]/members/[member]/route';
import * as population from '@/app/api/v1/collaborations/[collaboration]/populations/[population]/route';
import * as versions from '@/app/api/v1/collaborations/[collaboration]/populations/[population]/versions/route';
import * as oneToken from '@/app/api/v1/collaborations/[collaboration]/tokens/[token]/route';
import type { RouteHandler } from '@/app/api/v1/handler';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';

const { query } = withDatabase();

const definition = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  massIndex: -1.3,
  semiMajorAxisIndex: -0.6,
};

it('an id of another collaboration is not found, with the same body as an absent one', async () => {
  const team = await createCollaborationWith(['owner']);
  const otherTeam = await createCollaborationWith(['owner', 'student']);
  const foreignMember = otherTeam.memberIds.student;
  const [foreignInvitation] = await query<{ id: string }>(
    `insert into invitation (collaboration_id, email, roles, code_hash, expires_at)
       values ($1, 'x@y.example', '{student}', 'foreign', now() + interval '1 day') returning id`,
    [otherTeam.collaboration.id],
  );
  await tokenOf(otherTeam.people.owner, otherTeam.collaboration);
  const [foreignToken] = await query<{ id: string }>(
    'select id from access_token where collaboration_id = $1 limit 1',
    [otherTeam.collaboration.id],
  );
  await query(
    `insert into population (collaboration_id, number, version, name, definition, digest)
       values ($1, 77, 1, 'Theirs', $2, 'd')`,
    [otherTeam.collaboration.id, JSON.stringify(definition)],
  );
  const headers = bearer(await tokenOf(team.people.owner, team.collaboration));
  const absentId = '00000000-0000-4000-8000-000000000000';
  const pairs: [RouteHandler, string, string, string, unknown?][] = [
    [member.PATCH, 'PATCH', 'member', foreignMember, { roles: ['author'] }],
    [member.DELETE, 'DELETE', 'member', foreignMember],
    [invitation.DELETE, 'DELETE', 'invitation', foreignInvitation.id],
    [resend.POST, 'POST', 'invitation', foreignInvitation.id],
    [oneToken.DELETE, 'DELETE', 'token', foreignToken.id],
    [population.GET, 'GET', 'population', 'P-77'],
    [population.PATCH, 'PATCH', 'population', 'P-77', { isShared: true }],
    [versions.POST, 'POST', 'population', 'P-77', { convention: 'log', definition }],
  ];
  for (const [handler, method, name, id, body] of pairs) {
    const absent = name === 'population' ? 'P-78' : absentId;
    const odd = [absent, '1 or 1=1', '9'.repeat(400), '', '../audit'];
    const answers = await Promise.all(
      [id, ...odd].map((value) =>
        call(handler, {
          method,
          params: { collaboration: team.collaboration.slug, [name]: value },
          headers,
          body,
        }),
      ),
    );
    expect(answers.map(({ status }) => status)).toEqual(Array(odd.length + 1).fill(404));
    const bodies = await Promise.all(answers.map((answer) => answer.text()));
    expect(new Set(bodies).size).toBe(1);
  }
});
