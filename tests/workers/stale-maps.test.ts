import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as agree } from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/agree/route';
import { GET as getRelease } from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/route';
import { POST as signOff } from '@/app/api/v1/collaborations/[collaboration]/releases/[release]/sign-off/route';
import { POST as createRelease } from '@/app/api/v1/collaborations/[collaboration]/releases/route';
import {
  POST as freeze,
  GET as getStanding,
} from '@/app/api/v1/collaborations/[collaboration]/runs/[run]/freeze/route';
import { freezeStandingSchema } from '@/lib/schemas/releases';
import { ENGINE_VERSION } from '@/lib/sensitivity';
import { AnalysisRow, CompletenessMapRow, type RunRow, TargetRow } from '@/models';
import { enginesOfRun } from '@/models/engines-of-run';
import { portableDigests } from '@/models/portable-digest';
import { withDatabase } from '../support/database';
import { openReleaseLab, type ReleaseLab, readRelease } from '../support/release-lab';
import { runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

const OLDER = '3';

const { query } = withDatabase();
let lab: ReleaseLab;

beforeAll(async () => {
  await startWorker({ threads: 1 });
  lab = await openReleaseLab();
}, 60_000);
afterAll(killWorkers);

const reason = 'no calibration for a test';
const freezeIt = (run: RunRow) =>
  lab.ask(freeze, { role: 'author', params: { run: run.id }, body: { reason } });

/** Stores what a run holds as an earlier version of the product would have left it. */
async function rewrite(run: RunRow, fields: { inputs: unknown; result: unknown }): Promise<void> {
  await query('alter table run disable trigger run_result_is_final');
  await query('update run set inputs = $1, result = $2 where id = $3', [
    JSON.stringify(fields.inputs),
    JSON.stringify(fields.result),
    run.id,
  ]);
  await query('alter table run enable trigger run_result_is_final');
}

describe('a release of a run on maps of another engine', () => {
  it('names cause and remedy where its check finds other numbers', async () => {
    const { run, second } = lab;
    expect(run.inputs?.mapEngines).toEqual([ENGINE_VERSION]);
    for (const one of [run, second]) expect((await freezeIt(one)).status).toBe(201);
    const moved = ({ result }: RunRow) =>
      result && { ...result, answer: { ...result.answer, limit: result.answer.limit * 1.001 } };
    await rewrite(run, { inputs: { ...run.inputs, mapEngines: [OLDER] }, result: moved(run) });
    await rewrite(second, { inputs: second.inputs, result: moved(second) });
    const body = {
      title: 'Giant planets around five stars',
      authors: [{ name: 'I. Marrand' }],
      runIds: [run.id, second.id],
    };
    await readRelease(await lab.ask(createRelease, { role: 'author', body }));
    const params = { release: 'R-1' };
    await lab.ask(signOff, { role: 'statistician', params, method: 'POST' });
    const agreed = await readRelease(
      await lab.ask(agree, { role: 'owner', params, method: 'POST' }),
    );
    await untilEnded(agreed.job?.id ?? 'nothing is being checked');
    const shown = await readRelease(await lab.ask(getRelease, { role: 'owner', params }));
    expect(shown.state).toBe('mismatch');
    expect(shown.verification?.runs.map(({ cause }) => cause)).toEqual([
      `Its maps are of engine ${OLDER}, and the check makes them with engine ${ENGINE_VERSION}. ` +
        'Refresh the maps of Curlew, Dunlin (survey, Maps), run again, freeze that run ' +
        'and put it into the release in place of this one',
      null,
    ]);
  });
});

describe('a run on maps of another engine', () => {
  let run: RunRow;

  beforeAll(async () => {
    const target = await TargetRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const map = await CompletenessMapRow.findByPk(target.mapId as string, { rejectOnEmpty: true });
    const older = await CompletenessMapRow.create({
      ...map.get({ plain: true }),
      id: crypto.randomUUID(),
      digest: 'an older one',
      engineVersion: OLDER,
      inputs: { ...map.inputs, engineVersion: OLDER },
    });
    await target.update({ mapId: older.id });
    const analysis = await AnalysisRow.findByPk(lab.run.analysisId, { rejectOnEmpty: true });
    const owner = await lab.actor('owner');
    ({ run } = await runToEnd(owner, `A-${analysis.number}`));
  });

  it('says so', () => {
    expect(run.inputs?.mapEngines).toEqual([OLDER, ENGINE_VERSION]);
  });

  it('is told from its stored maps where it does not, with the same portable digest', async () => {
    const { mapEngines: _, ...inputs } = run.inputs ?? {};
    const before = { id: run.id, recipe: run.recipe, inputs: inputs as never, result: run.result };
    expect(await enginesOfRun(before)).toEqual([OLDER, ENGINE_VERSION]);
    expect(portableDigests(before)).toEqual(portableDigests(run));
  });

  it('is not frozen, and the refusal says what helps', async () => {
    const params = { run: run.id };
    const standing = freezeStandingSchema.parse(
      await (await lab.ask(getStanding, { role: 'student', params })).json(),
    );
    const check = standing.checks.find(({ name }) => name === 'maps');
    expect(check).toMatchObject({ isMet: false, stops: true });
    expect(check?.words).toBe(
      'Maps that their curves would not give now: 1 of Curlew (Star 2: the engine was version ' +
        `${OLDER} and is ${ENGINE_VERSION}). Refresh the maps of Curlew (survey, Maps), ` +
        'run again, freeze that run',
    );
    const refused = await freezeIt(run);
    expect([refused.status, (await refused.json()).detail]).toEqual([
      409,
      expect.stringContaining('Refresh the maps of Curlew'),
    ]);
  });
});
