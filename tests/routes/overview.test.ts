import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET as getOverview } from '@/app/api/v1/collaborations/[collaboration]/overview/route';
import { overviewSchema } from '@/lib/schemas/overview';
import { copyAnalysis, updateAnalysis } from '@/lib/services/analyses';
import { TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildFinishedLab, type FinishedLab } from '../support/finished-run';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildCompanion, buildTarget } from '../support/sample';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

withDatabase();
let lab: FinishedLab;

beforeAll(async () => {
  await startWorker({ threads: 1 });
  lab = await buildFinishedLab();
});
afterAll(killWorkers);

async function overviewOf(headers: Record<string, string>, collaboration: string) {
  const response = await call(getOverview, { headers, params: { collaboration } });
  expect(response.status).toBe(200);
  return overviewSchema.parse(await response.json());
}

describe('GET overview', () => {
  it('tells where the lead analysis stands and how its limit has moved', async () => {
    const recipe = { ...lab.analysis.recipe, detections: 'none' as const };
    await updateAnalysis(lab.owner, lab.key, { recipe });
    await runToEnd(lab.owner, lab.key);
    await runToEnd(lab.owner, lab.key);
    const headers = bearer(await tokenOf(lab.people.student, lab.collaboration));
    const overview = await overviewOf(headers, lab.collaboration.slug);
    expect(overview.lead).toBe(lab.key);
    expect(overview.people).toBe(5);
    expect(overview.history.map(({ run, label }) => [run, label])).toEqual([
      [1, '8 stars'],
      [2, 'detections set aside'],
      [3, 'run again'],
    ]);
    expect(overview.history[1].limit).toBe(overview.history[0].zeroLimit);
    expect(overview.analyses[0].state).toBe('run');
    expect(overview.waiting).toEqual([]);
    expect(overview.log.map(({ what }) => what)).toContain(`started run 1 of ${lab.key}`);
    expect(overview.can).toEqual({ invite: false, addSurvey: false, addAnalysis: true });
  });

  it('lists what waits for a person: failures and candidates inside the ranges', async () => {
    const target = await TargetRow.findOne({ where: { name: 'Star 5' }, rejectOnEmpty: true });
    await buildCompanion(target, { name: 'cc1', status: 'candidate' });
    await buildCompanion(target, { name: 'cc2', status: 'candidate', semiMajorAxisAu: 2000 });
    await buildTarget(lab.survey, {
      name: 'Ageless',
      ageMyr: null,
      ageLowerMyr: null,
      ageUpperMyr: null,
    });
    await untilEnded(await askForMaps(lab.survey));
    const draft = await copyAnalysis(lab.owner, lab.key, {});
    await runToEnd(lab.owner, draft.key);
    const headers = bearer(await tokenOf(lab.people.owner, lab.collaboration));
    const { waiting } = await overviewOf(headers, lab.collaboration.slug);
    expect(waiting.map(({ fact }) => fact)).toEqual([
      `Run 1 of ${draft.key} failed`,
      '1 map failed',
      '1 undecided candidate inside the ranges',
    ]);
    expect(waiting[0].detail).toContain('Ageless');
    expect(waiting[2].detail).toBe(`${lab.survey.name}: Star 5 cc1`);
  });

  it('shows another collaboration nothing of this one', async () => {
    const other = await createCollaborationWith(['owner']);
    const headers = bearer(await tokenOf(other.people.owner, other.collaboration));
    const overview = await overviewOf(headers, other.collaboration.slug);
    expect([
      overview.analyses,
      overview.history,
      overview.waiting,
      overview.jobs,
      overview.log,
    ]).toEqual([[], [], [], [], []]);
    expect(overview.lead).toBeNull();
    const params = { collaboration: lab.collaboration.slug };
    expect((await call(getOverview, { headers, params })).status).toBe(404);
  });
});
