import { beforeAll, describe, expect, it } from 'vitest';
import { POST as cancel } from '@/app/api/v1/collaborations/[collaboration]/jobs/[job]/cancel/route';
import { POST as retry } from '@/app/api/v1/collaborations/[collaboration]/jobs/[job]/retry/route';
import { GET as get } from '@/app/api/v1/collaborations/[collaboration]/jobs/[job]/route';
import { GET as list } from '@/app/api/v1/collaborations/[collaboration]/jobs/route';
import { jobSchema } from '@/lib/schemas/jobs';
import type { SurveyRow } from '@/models';
import { withDatabase } from '../support/database';
import {
  bearer,
  call,
  createCollaborationWith,
  type TestCollaboration,
  tokenOf,
} from '../support/people';
import { buildSurvey, buildTarget } from '../support/sample';
import { askForMaps } from '../support/work';

const { query } = withDatabase();
let collaboration: TestCollaboration;
let survey: SurveyRow;
let lead: Record<string, string>;
let student: Record<string, string>;
let stranger: { headers: Record<string, string>; slug: string };

beforeAll(async () => {
  const made = await createCollaborationWith(['collaborator', 'student']);
  collaboration = made.collaboration;
  survey = await buildSurvey(collaboration.id, { leadId: made.people.collaborator.id });
  await buildTarget(survey);
  lead = bearer(await tokenOf(made.people.collaborator, collaboration));
  student = bearer(await tokenOf(made.people.student, collaboration));
  const other = await createCollaborationWith(['owner']);
  stranger = {
    headers: bearer(await tokenOf(other.people.owner, other.collaboration)),
    slug: other.collaboration.slug,
  };
});

const at = (job?: string) => ({ collaboration: collaboration.slug, ...(job && { job }) });

describe('jobs', () => {
  it('are listed with what they work on', async () => {
    const id = await askForMaps(survey);
    const response = await call(list, { headers: student, params: at() });
    const { jobs } = (await response.json()) as { jobs: unknown[] };
    const job = jobSchema.parse(jobs[0]);
    expect(job).toMatchObject({ id, kind: 'compute-maps', status: 'waiting', timeLeftS: null });
    expect(job.subject).toBe(survey.name);
    const elsewhere = await call(list, {
      headers: stranger.headers,
      params: { collaboration: stranger.slug },
    });
    expect(await elsewhere.json()).toEqual({ jobs: [] });
  });

  it('are stopped and started again by those who may start them', async () => {
    const id = await askForMaps(survey);
    const post = (handler: typeof cancel, headers: Record<string, string>) =>
      call(handler, { method: 'POST', headers, params: at(id), body: {} });
    expect((await post(cancel, student)).status).toBe(403);
    const stopped = jobSchema.parse(await (await post(cancel, lead)).json());
    expect(stopped.status).toBe('cancelled');
    expect((await post(cancel, lead)).status).toBe(409);
    const waiting = jobSchema.parse(await (await post(retry, lead)).json());
    expect(waiting.status).toBe('waiting');
    expect((await post(retry, lead)).status).toBe(409);
    expect(await query('select key from queue._private_jobs')).toEqual([{ key: id }]);
  });

  it('are not found by strangers, nor under an id that is none', async () => {
    const id = await askForMaps(survey);
    for (const handler of [get, cancel, retry]) {
      const params = { collaboration: stranger.slug, job: id };
      const method = handler === get ? 'GET' : 'POST';
      const foreign = await call(handler, { method, headers: stranger.headers, params });
      expect(foreign.status).toBe(404);
      const none = await call(handler, { method, headers: lead, params: at('17') });
      expect(none.status).toBe(404);
      expect((await call(handler, { method, params: at(id) })).status).toBe(401);
    }
  });
});
