import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/access/actor';
import { type StudyKind, studySettingsSchema } from '@/lib/schemas/study-settings';
import { getStudyMaps, removeStudy, startStudy } from '@/lib/services/studies';
import {
  CompletenessMapRow,
  CoolingTableRow,
  type RunRow,
  type SurveyRow,
  TargetRow,
} from '@/models';
import { answerRunQuestion } from '@/workers/answers/run-question';
import { withDatabase } from '../support/database';
import { actorOf, createCollaborationWith } from '../support/people';
import {
  buildAnalysis,
  buildCompanion,
  buildPopulation,
  buildSurvey,
  buildTarget,
  recipeOf,
} from '../support/sample';
import { askToEnd, type GivenSettings, questionOfRun } from '../support/study';
import { askForMaps, runToEnd, untilEnded } from '../support/work';
import { killWorkers, startWorker } from '../support/worker';

const { query } = withDatabase();

let actor: Actor;
let surveys: SurveyRow[];
let run: RunRow;
let collaborationId: string;

/** Two surveys of three stars each; one star is in both, one has a companion. */
beforeAll(async () => {
  await startWorker({ threads: 2 });
  const { collaboration, people } = await createCollaborationWith(['owner']);
  collaborationId = collaboration.id;
  actor = await actorOf(people.owner, collaboration);
  surveys = [];
  for (const name of ['North', 'South']) {
    const survey = await buildSurvey(collaborationId, { name });
    const movingGroup = name === 'North' ? 'beta Pictoris' : null;
    const stars =
      name === 'North' ? ['Star 1', 'Star 2', 'Star 3'] : ['Star 3', 'Star 4', 'Star 5'];
    for (const star of stars) {
      const target = await buildTarget(survey, {
        name: star,
        movingGroup,
        distancePc: 10 + 4 * Number(star.slice(-1)),
        curves: name === 'North' ? [{}] : [{ contrastMag: [6.5, 9, 11.8, 13.4, 14.5, 14.9] }],
      });
      if (star === 'Star 4') await buildCompanion(target);
    }
    expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
    surveys.push(survey);
  }
  const population = await buildPopulation(collaborationId);
  run = await analyse(surveys, population.id);
});
afterAll(killWorkers);

async function analyse(of: SurveyRow[], populationId: string, given = {}): Promise<RunRow> {
  const recipe = { ...recipeOf(of, { id: populationId } as never), ...given };
  const analysis = await buildAnalysis(collaborationId, recipe, actor.personId);
  const ended = await runToEnd(actor, `A-${analysis.number}`);
  expect(ended.job.fault).toBeNull();
  return ended.run;
}

const ask = <Kind extends StudyKind>(of: RunRow, settings: GivenSettings<Kind>) =>
  askToEnd<Kind>(actor, of, settings);

const limitOf = (of: RunRow) => of.result?.answer.limit as number;
const mapCount = () => CompletenessMapRow.count({ where: { collaborationId } });

describe('what moves the limit', () => {
  it('makes the maps of every change anew, and gives the same the second time', async () => {
    const { result, inputs } = await ask<'systematics'>(run, { kind: 'systematics' });
    expect(result.baseline).toBe(limitOf(run));
    expect(result.rows.map(({ change }) => change.change)).toEqual([
      'ages-young',
      'ages-old',
      'distances-near',
      'distances-far',
      'threshold',
      'n-sigma-up',
      'n-sigma-down',
      'eccentricity',
      'combination',
      'combination',
      'combination',
    ]);
    const ratio = (label: string) => {
      const row = result.rows.find((one) => one.label === label);
      expect(row?.fault, label).toBeNull();
      return row?.ratio as number;
    };
    // Young companions are brighter and near stars show them: both make the limit tighter.
    expect(ratio('ages one sigma younger')).toBeLessThan(1);
    expect(ratio('ages one sigma older')).toBeGreaterThan(1);
    expect(ratio('threshold one sigma higher')).toBeGreaterThan(1);
    expect(ratio('threshold one sigma lower')).toBeLessThan(1);
    expect(ratio('shared stars: same position')).toBe(1);
    expect(ratio('shared stars: deepest map')).toBeGreaterThan(1);
    expect(inputs.further.length).toBe(result.rows.length);
    const maps = await mapCount();
    const changes = result.rows.map(({ change }) => change);
    const again = await ask<'systematics'>(run, { kind: 'systematics', changes });
    expect(again.result).toEqual(result);
    expect(await mapCount()).toBe(maps);
  });

  it('keeps the maps of other ages and cooling models, and the limits on them', async () => {
    const cold = await CoolingTableRow.create({
      ...{ collaborationId, name: 'Cold start', digest: 'cold', startCondition: 'cold' },
      ...{ massMjup: [0.1, 100], ageMyr: [0.1, 14_000] },
      magnitudes: { H: [14, 19, 6, 11], J: [1, 1, 1, 1] },
    });
    const { study, result } = await ask<'ages-cooling'>(run, { kind: 'ages-cooling' });
    expect(result.models.map(({ model, startCondition }) => [model, startCondition])).toEqual([
      ['as-run', 'unstated'],
      [cold.id, 'cold'],
    ]);
    const [own, other] = result.models;
    expect(own.shifts.map(({ fault }) => fault)).toEqual([null, null, null, null, null]);
    expect(own.shifts[2].limit).toBe(limitOf(run));
    expect(own.shifts[2].starsUnchanged).toBe(run.result?.stars);
    const limits = own.shifts.map(({ limit }) => limit as number);
    expect([...limits].sort((a, b) => a - b)).toEqual(limits);
    const changes = await ask<'systematics'>(run, {
      kind: 'systematics',
      changes: [
        { change: 'ages-young' },
        { change: 'ages-old' },
        { change: 'cooling', coolingTableId: cold.id },
      ],
    });
    expect(changes.result.rows.map(({ limit }) => limit)).toEqual([
      limits[1],
      limits[3],
      other.shifts[2].limit,
    ]);

    const question = await questionOfRun(run);
    const stack = async (cooling: string, age: number) => {
      const { bytes, shape } = await getStudyMaps(actor, study.id, { cooling, age });
      expect(shape).toEqual([
        5,
        question.grid.massMjup.length,
        question.grid.semiMajorAxisAu.length,
      ]);
      return new Uint16Array(Uint8Array.from(bytes).buffer);
    };
    expect(await stack('as-run', 0)).toEqual(question.maps);
    for (const { model, shifts } of result.models) {
      for (const [i, age] of result.ageShifts.entries()) {
        const { limit } = answerRunQuestion({ ...question, maps: await stack(model, age) });
        expect(limit).toBeCloseTo(shifts[i].limit as number, 12);
      }
    }
    await expect(
      getStudyMaps(actor, changes.study.id, { cooling: 'as-run', age: 0 }),
    ).rejects.toThrow('maps of this question');
    await expect(getStudyMaps(actor, study.id, { cooling: 'built-in', age: 0 })).rejects.toThrow(
      'this age and cooling model',
    );
    await expect(query('update study_map set position = 99')).rejects.toThrow('are not changed');
    await removeStudy(actor, study.id);
    expect(await query('select 1 from study_map')).toEqual([]);
    await removeStudy(actor, changes.study.id);
    await cold.destroy();
  });

  it('says why an age has no maps, and keeps the others', async () => {
    const narrow = await CoolingTableRow.create({
      ...{ collaborationId, name: 'Narrow', digest: 'narrow' },
      ...{ massMjup: [0.1, 100], ageMyr: [5, 60] },
      magnitudes: { H: [14, 19, 6, 11] },
    });
    const { study, result } = await ask<'ages-cooling'>(run, {
      kind: 'ages-cooling',
      coolingTableIds: [narrow.id],
    });
    const shifts = result.models[1].shifts;
    const old = shifts[4];
    expect(old).toMatchObject({ limit: null, hasMaps: false });
    expect(old.fault).toMatch(/Star \d: age node .* must be between 5 and 60 Myr for Narrow/);
    await expect(getStudyMaps(actor, study.id, { cooling: narrow.id, age: 2 })).rejects.toThrow(
      'this age and cooling model',
    );
    expect(shifts.some(({ hasMaps }) => hasMaps)).toBe(true);
    await removeStudy(actor, study.id);
    await narrow.destroy();
  });

  it('gives the limit that a run with the same change gives', async () => {
    const { result } = await ask<'systematics'>(run, {
      kind: 'systematics',
      changes: [{ change: 'threshold' }, { change: 'eccentricity', law: { law: 'circular' } }],
    });
    for (const [i, change] of [
      { threshold: 'hard' },
      { eccentricity: { law: 'circular' } },
    ].entries()) {
      const changed = [];
      for (const survey of surveys) {
        const before = survey.mapSettings;
        await survey.update({ mapSettings: { ...before, ...change } as typeof before });
        expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
        changed.push({ survey, before });
      }
      const other = await analyse(surveys, run.recipe.populationId);
      expect(result.rows[i].limit).toBe(limitOf(other));
      for (const { survey, before } of changed) {
        await survey.update({ mapSettings: before });
        expect((await untilEnded(await askForMaps(survey))).status).toBe('done');
      }
    }
  });

  it('refuses when a star has changed since the run', async () => {
    const target = await TargetRow.findOne({
      where: { surveyId: surveys[0].id, name: 'Star 1' },
      rejectOnEmpty: true,
    });
    await target.update({ ageMyr: 50 });
    const { job } = await startStudy(
      actor,
      run.id,
      studySettingsSchema.parse({ kind: 'systematics', changes: [{ change: 'ages-old' }] }),
    );
    const ended = await untilEnded(job.id);
    expect(ended.status).toBe('failed');
    expect(ended.fault).toContain('Star 1');
    await target.update({ ageMyr: 45 });
  });
});

describe('overlaps', () => {
  it('give the limits that runs by each rule give, within the bounds of any rule', async () => {
    const { result } = await ask<'overlap-rules'>(run, { kind: 'overlap-rules' });
    for (const { rule, limit } of result.rules) {
      if (rule === 'refuse') {
        expect(limit).toBeNull();
        continue;
      }
      const other = await analyse(surveys, run.recipe.populationId, { combination: rule });
      expect(limit).toBe(limitOf(other));
      expect(limit).toBeLessThanOrEqual(result.bracket.highest);
      expect(limit).toBeGreaterThanOrEqual(result.bracket.lowest);
    }
    expect(result.bracket.lowest).toBeLessThan(result.bracket.highest);
    const [star] = result.shared;
    expect(result.shared).toHaveLength(1);
    expect(star).toMatchObject({ name: 'Star 3', surveys: ['North', 'South'] });
    const { samePosition, deepest, independent } = star.probability;
    expect(deepest).toBeLessThan(samePosition as number);
    expect(samePosition as number).toBeLessThan(independent);
  });

  it('are refused where no star is shared', async () => {
    const alone = await analyse([surveys[0]], run.recipe.populationId);
    await expect(
      startStudy(actor, alone.id, studySettingsSchema.parse({ kind: 'overlap-rules' })),
    ).rejects.toThrow('No star of this run is in several surveys');
  });
});

describe('which stars carry the limit', () => {
  it('equals runs without a survey, and without a star', async () => {
    const { result } = await ask<'influence'>(run, { kind: 'influence' });
    expect(result.limit).toBe(limitOf(run));
    expect(result.stars).toHaveLength(5);
    const withoutSouth = await analyse([surveys[0]], run.recipe.populationId);
    const south = result.surveys.find(({ name }) => name === 'South');
    expect(south?.without.limit).toBeCloseTo(limitOf(withoutSouth), 12);
    const target = await TargetRow.findOne({
      where: { surveyId: surveys[1].id, name: 'Star 4' },
      rejectOnEmpty: true,
    });
    await target.update({ leftOutReason: 'for this test' });
    const without = await analyse(surveys, run.recipe.populationId);
    await target.update({ leftOutReason: null });
    const star = result.stars.find(({ name }) => name === 'Star 4');
    expect(star?.hosts).toEqual(['Star 4 b']);
    expect(star?.without.limit).toBeCloseTo(limitOf(without), 12);
    expect(star?.without.exposure).toBeCloseTo(without.result?.exposure as number, 12);
    const total = result.stars.reduce((sum, { probability }) => sum + probability, 0);
    expect(total).toBeCloseTo(result.exposure, 12);
    expect(result.groups).toMatchObject([{ name: 'beta Pictoris', stars: 3 }]);
    expect(result.groups[0].without.limit).toBeGreaterThan(result.limit);
  });
});

describe('maps that are stored', () => {
  it('are used as they are, not computed again', async () => {
    const change = { change: 'ages-young' as const };
    await ask<'systematics'>(run, { kind: 'systematics', changes: [change] });
    await query(
      `update completeness_map set node_values = decode(repeat('ffff', octet_length(node_values) / 2), 'hex')
       where collaboration_id = $1
         and not digest = any(select m.digest from run_star s join completeness_map m on m.id = s.map_id
           where s.run_id = $2)`,
      [collaborationId, run.id],
    );
    const { result } = await ask<'systematics'>(run, {
      kind: 'systematics',
      changes: [change, { change: 'ages-old' }],
    });
    expect(result.rows.map(({ exposure }) => exposure)).toEqual([
      expect.closeTo(5, 9),
      expect.closeTo(5, 9),
    ]);
  });
});
