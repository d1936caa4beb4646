import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as addObservation } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/observations/route';
import { GET as getCandidate } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/route';
import { POST as giveVerdict } from '@/app/api/v1/collaborations/[collaboration]/candidates/[candidate]/verdicts/route';
import { GET as listCandidates } from '@/app/api/v1/collaborations/[collaboration]/candidates/route';
import { type Actor, EVERY_SCOPE } from '@/lib/access/actor';
import { candidateListSchema, giveVerdictSchema } from '@/lib/schemas/candidates';
import { getCandidate as readCandidate } from '@/lib/services/candidates/detail';
import { giveVerdict as decide } from '@/lib/services/candidates/verdicts';
import { closeReaders } from '@/lib/services/reading';
import { receiveUpload } from '@/lib/services/receive-upload';
import { storeUpload } from '@/lib/services/uploads';
import type { SurveyRow, TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import {
  bearer,
  call,
  createCollaborationWith,
  type TestCollaboration,
  tokenOf,
} from '../support/people';
import { buildCompanion, buildSurvey, buildTarget } from '../support/sample';

withDatabase();
let collaboration: TestCollaboration;
let actor: Actor;
let survey: SurveyRow;
let target: TargetRow;
let owner: Record<string, string>;
let foreign: { headers: Record<string, string>; slug: string };

beforeAll(async () => {
  const team = await createCollaborationWith(['owner']);
  ({ collaboration } = team);
  survey = await buildSurvey(collaboration.id);
  target = await buildTarget(survey, { name: 'Host' });
  owner = bearer(await tokenOf(team.people.owner, collaboration));
  actor = {
    personId: team.people.owner.id,
    personName: team.people.owner.name,
    email: team.people.owner.email,
    collaborationId: collaboration.id,
    collaboration: collaboration.slug,
    roles: ['owner'],
    via: 'session',
    scopes: [...EVERY_SCOPE],
  };
  const other = await createCollaborationWith(['owner']);
  foreign = {
    headers: bearer(await tokenOf(other.people.owner, other.collaboration)),
    slug: other.collaboration.slug,
  };
  await buildCompanion(target, { name: 'b' });
  await buildCompanion(target, { name: 'cc1', status: 'background' });
  await buildCompanion(target, { name: 'cc2', status: 'background' });
  await buildCompanion(target, { name: 'cc3', status: 'background' });
  await buildCompanion(target, { name: 'cc4', status: 'ambiguous' });
});

async function bringIn(rows: string) {
  const header =
    'target,companion,status,mass,semi_major_axis,epoch,separation [arcsec],separation_error,position_angle [deg],position_angle_error,contrast [mag],band';
  const request = new Request('http://localhost/uploads', {
    method: 'POST',
    body: `${header}\n${rows}\n`,
  });
  const query = { kind: 'companions' as const, name: 'companions.csv', survey: survey.slug };
  const read = await receiveUpload(actor, { ...query, settings: undefined }, request);
  return storeUpload(actor, read.id);
}

async function findByName(name: string) {
  const list = await call(listCandidates, {
    headers: owner,
    params: { collaboration: collaboration.slug },
  });
  const { candidates } = candidateListSchema.parse(await list.json());
  const found = candidates.find((one) => one.name === name);
  if (!found) throw new Error(`no ${name}`);
  return readCandidate(actor, found.id);
}

describe('a file of companions', () => {
  it('brings the epoch and the first verdict, and a later file adds to both', async () => {
    await bringIn('Host,cc8,candidate,5,40,2016-03-01,0.8,0.004,-30,0.2,11.5,H');
    const first = await findByName('cc8');
    expect(first.seen).toHaveLength(1);
    expect(first.seen[0]).toMatchObject({
      observedOn: '2016-03-01',
      separationErrorArcsec: 0.004,
      positionAngleDeg: 330,
      contrastMag: 11.5,
      band: 'H',
      isFromFile: true,
      by: actor.personName,
    });
    expect(first.history.map(({ status, file, massFrom }) => [status, file, massFrom])).toEqual([
      ['candidate', 'companions.csv', 'file'],
    ]);
    // The same day as a Modified Julian Date, and another one.
    await bringIn('Host,cc8,candidate,5,40,57448.3,0.81,0.004,331,0.2,11.5,H');
    await bringIn('Host,cc8,candidate,5,40,2018-03-01,0.82,,332,,11.5,H');
    const now = await findByName('cc8');
    expect(
      now.seen.map(({ observedOn, separationArcsec, separationErrorArcsec }) => [
        observedOn,
        separationArcsec,
        separationErrorArcsec,
      ]),
    ).toEqual([
      ['2016-03-01', 0.81, 0.004],
      ['2018-03-01', 0.82, null],
    ]);
    expect(now.history).toHaveLength(1);
  });

  it('says so where it overrules a verdict, and the history keeps both', async () => {
    await bringIn('Host,cc9,candidate,5,40,,,,,,,');
    const { id } = await findByName('cc9');
    const verdict = { status: 'background', reason: 'reddened star' };
    await decide(actor, id, giveVerdictSchema.parse(verdict));
    const { report } = await bringIn('Host,cc9,confirmed,5,40,,,,,,,');
    expect(report.notes.map(({ code }) => code)).toContain('verdict-overruled');
    const now = await readCandidate(actor, id);
    expect(now.history.map(({ status, file }) => [status, file])).toEqual([
      ['candidate', 'companions.csv'],
      ['background', null],
      ['confirmed', 'companions.csv'],
    ]);
  });
});

const EPOCH = {
  observedOn: '2016-01-01',
  separationArcsec: 1,
  separationErrorArcsec: 0.004,
  positionAngleDeg: 1,
  positionAngleErrorDeg: 0.3,
};

describe('GET candidates', () => {
  it('lists what waits for a person first, and filters', async () => {
    const params = { collaboration: collaboration.slug };
    const all = candidateListSchema.parse(
      await (await call(listCandidates, { headers: owner, params })).json(),
    );
    expect(all.total).toBe(all.candidates.length);
    expect(all.lead).toBeNull();
    const ranks = all.candidates.map(({ isOpen }) => (isOpen ? 0 : 1));
    expect(ranks).toEqual([...ranks].sort());
    const filtered = candidateListSchema.parse(
      await (
        await call(listCandidates, {
          headers: owner,
          params,
          path: `/candidates?status=background&survey=${survey.slug}&limit=2`,
        })
      ).json(),
    );
    expect(filtered.candidates.map(({ status }) => status)).toEqual(['background', 'background']);
    expect(filtered.total).toBe(all.counts.background);
    expect(filtered.counts).toEqual(all.counts);
  });

  it('shows nothing to another collaboration, and answers absent and foreign alike', async () => {
    const row = await buildCompanion(target, { name: 'cc5', status: 'candidate' });
    const params = { collaboration: foreign.slug };
    const list = candidateListSchema.parse(
      await (await call(listCandidates, { headers: foreign.headers, params })).json(),
    );
    expect(list).toMatchObject({ candidates: [], total: 0 });
    const verdict = { status: 'background', reason: 'not ours' };
    const absent = '00000000-0000-4000-8000-000000000000';
    for (const [handler, method, body] of [
      [getCandidate, 'GET', undefined],
      [giveVerdict, 'POST', verdict],
      [addObservation, 'POST', EPOCH],
    ] as const) {
      const answers = await Promise.all(
        [row.id, absent, '1 or 1=1', ''].map((id) =>
          call(handler, {
            method,
            headers: foreign.headers,
            params: { ...params, candidate: id },
            body,
          }),
        ),
      );
      expect(answers.map(({ status }) => status)).toEqual([404, 404, 404, 404]);
      expect(new Set(await Promise.all(answers.map((answer) => answer.text()))).size).toBe(1);
    }
    expect((await row.reload()).status).toBe('candidate');
  });
});

afterAll(closeReaders);
