import { expect, it, vi } from 'vitest';
import { withDatabase } from '../support/database';

vi.stubEnv('RAREBOUND_METRICS_TOKEN', 'for-the-collector-only');
const { GET: getMetrics } = await import('@/app/api/metrics/route');
const { GET: getReadiness } = await import('@/app/api/ready/route');
const { GET: getCollaboration } = await import('@/app/api/v1/collaborations/[collaboration]/route');
const { POST: createAnalysis } = await import(
  '@/app/api/v1/collaborations/[collaboration]/analyses/route'
);
const { POST: startRun } = await import(
  '@/app/api/v1/collaborations/[collaboration]/analyses/[analysis]/runs/route'
);
const { bearer, call, createCollaborationWith, tokenOf, webAddress } = await import(
  '../support/people'
);
const { buildPopulation, buildSurvey, buildTarget, recipeOf } = await import('../support/sample');

const { query } = withDatabase();
const readMetrics = (authorization?: string) =>
  getMetrics(
    new Request(`${webAddress()}/api/metrics`, {
      headers: authorization ? { authorization } : {},
    }),
  );
/** The value of one line of the text format. */
const numberIn = (text: string, line: string) =>
  Number(
    text
      .split('\n')
      .find((one) => one.startsWith(`${line} `))
      ?.slice(line.length + 1),
  );

it('metrics are for whoever holds their token, and count what was asked', async () => {
  expect((await readMetrics()).status).toBe(401);
  expect((await readMetrics('Bearer for-the-collector-onlY')).status).toBe(401);

  const { collaboration, people } = await createCollaborationWith(['owner']);
  const headers = bearer(await tokenOf(people.owner, collaboration));
  const params = { collaboration: collaboration.slug };
  const labels = '{method="GET",noun="collaborations",status="200"}';
  const asked = async () => {
    const text = await (await readMetrics('Bearer for-the-collector-only')).text();
    return numberIn(text, `rarebound_request_seconds_count${labels}`) || 0;
  };
  // Other tests of this process have asked before.
  const before = await asked();
  for (let i = 0; i < 3; i++) {
    await call(getCollaboration, { params, headers, path: '/api/v1/collaborations/some-team' });
  }
  const answer = await readMetrics('Bearer for-the-collector-only');
  expect(answer.headers.get('content-type')).toMatch(/^text\/plain/);
  const text = await answer.text();
  expect((await asked()) - before).toBe(3);
  expect(numberIn(text, 'rarebound_database_bytes')).toBeGreaterThan(1e6);
  expect(numberIn(text, 'rarebound_worker_processes')).toBe(0);
  expect(numberIn(text, 'rarebound_oldest_waiting_job_seconds')).toBe(0);
});

it('a job carries the id of the request that asked for it, and waits in the metrics', async () => {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  const headers = bearer(await tokenOf(people.owner, collaboration));
  const params = { collaboration: collaboration.slug };
  const survey = await buildSurvey(collaboration.id, { leadId: people.owner.id });
  await buildTarget(survey, { name: 'Star 1', distancePc: 20 });
  const recipe = recipeOf([survey], await buildPopulation(collaboration.id));
  const body = { name: 'A question', recipe };
  const made = await call(createAnalysis, { method: 'POST', params, headers, body });
  const { key } = await made.json();
  const asked = await call(startRun, {
    method: 'POST',
    params: { ...params, analysis: key },
    headers,
  });
  expect(asked.status).toBe(201);
  const jobs = await query<{ request_id: string }>('select request_id from job where kind = $1', [
    'compute-run',
  ]);
  expect(jobs).toEqual([{ request_id: asked.headers.get('x-request-id') }]);
  const text = await (await readMetrics('Bearer for-the-collector-only')).text();
  expect(numberIn(text, 'rarebound_jobs{kind="compute-run",status="waiting"}')).toBe(1);
});

it('a server is ready when its database has the schema of its code', async () => {
  expect(await (await getReadiness()).json()).toMatchObject({ isReady: true, workers: 0 });
  const [{ name }] = await query<{ name: string }>(
    'delete from "SequelizeMeta" where name = (select max(name) from "SequelizeMeta") returning name',
  );
  const answer = await getReadiness();
  expect(answer.status).toBe(503);
  expect(await answer.json()).toMatchObject({ isReady: false, missingMigrations: [name] });
});
