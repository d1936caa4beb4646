import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as adopt } from '@/app/api/v1/collaborations/[collaboration]/stars/[star]/adopt/route';
import { GET as getStar } from '@/app/api/v1/collaborations/[collaboration]/stars/[star]/route';
import { POST as confirm } from '@/app/api/v1/collaborations/[collaboration]/stars/overlaps/[pair]/confirm/route';
import {
  GET as listOverlaps,
  POST as propose,
} from '@/app/api/v1/collaborations/[collaboration]/stars/overlaps/route';
import { POST as previewAdoption } from '@/app/api/v1/collaborations/[collaboration]/value-tables/preview/route';
import {
  POST as adoptMany,
  GET as listTables,
} from '@/app/api/v1/collaborations/[collaboration]/value-tables/route';
import {
  adoptionPreviewSchema,
  overlapsSchema,
  starPageSchema,
  valueTablesSchema,
} from '@/lib/schemas/stars';
import { CompletenessMapRow, JobRow, StarRow, TargetRow } from '@/models';
import { withDatabase } from '../support/database';
import { buildTwoSurveys } from '../support/two-surveys';
import { killWorkers, startWorker, until } from '../support/worker';

const { query } = withDatabase();
type Lab = Awaited<ReturnType<typeof buildTwoSurveys>>;
let both: Lab['both'];
let ask: Lab['ask'];
let runBoth: Lab['runBoth'];
let list: Lab['list'];

beforeAll(async () => {
  await startWorker({ threads: 1 });
  ({ both, ask, runBoth, list } = await buildTwoSurveys());
  // A run of both wants the pair decided: here it is one star.
  await ask(propose, {}, {});
  const [pair] = overlapsSchema.parse(await (await ask(listOverlaps)).json()).open;
  expect((await ask(confirm, { pair: pair.id }, { why: 'Same place' })).status).toBe(200);
});
afterAll(killWorkers);

const mapsAreReady = () =>
  until('no map job is open', async () => {
    const open = await JobRow.count({
      where: { kind: 'compute-maps', status: ['waiting', 'running'] },
    });
    return open === 0;
  });

describe('adopted ages', () => {
  const mapDigests = async () => {
    const targets = await TargetRow.findAll({ where: { name: 'Star 2' }, order: [['id', 'ASC']] });
    const maps = await CompletenessMapRow.findAll({ attributes: ['id', 'digest'] });
    const digestOf = new Map(maps.map(({ id, digest }) => [id, digest]));
    return targets.map(({ mapId }) => digestOf.get(mapId ?? ''));
  };
  const findStar2 = () => list('q=star2');

  it('make a numbered table, new maps and other conditions; taking them back gives the old maps', async () => {
    const star = await StarRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const before = starPageSchema.parse(await (await ask(getStar, { star: star.id })).json());
    // 45 - 5 and 24 + 3 facing each other: 21 / hypot(5, 3) = 3.6, by hand.
    expect(before.conflicts.age).toBeCloseTo(21 / Math.hypot(5, 3), 10);
    expect(before.age?.source).toEqual({ kind: 'survey', words: 'First', table: null });
    expect((await findStar2()).counts.ageConflicts).toBe(1);
    const own = await mapDigests();
    const older = await runBoth();
    expect(older.inputs?.adopted).toBeUndefined();

    const entry = before.entries.find(({ survey }) => survey.name === 'Second');
    const choice = { kind: 'entry', targetId: entry?.targetId };
    const body = { quantity: 'age', choice, why: 'Lithium' };
    const adopted = starPageSchema.parse(await (await ask(adopt, { star: star.id }, body)).json());
    expect(adopted.age?.value.ageMyr).toBe(24);
    expect(adopted.age?.source.words).toBe('ages table 1, from Second');
    expect((await findStar2()).counts.ageConflicts).toBe(0);
    await mapsAreReady();
    const [one, two] = await mapDigests();
    // Curve, distance and host are alike in both surveys: with one age they share one map.
    expect(new Set(own).size).toBe(2);
    expect([one, own.includes(one)]).toEqual([two, true]);
    const newer = await runBoth();
    expect(newer.inputs?.adopted).toEqual([{ quantity: 'age', table: 1, stars: 1 }]);
    expect(newer.result?.statement.conditions.join('\n')).toContain('ages table 1');
    expect(newer.resultDigest).not.toBe(older.resultDigest);
    await older.reload();
    expect(older.inputs?.adopted).toBeUndefined();

    const none = { quantity: 'age', choice: { kind: 'none' }, why: 'Lithium was another star’s' };
    expect((await ask(adopt, { star: star.id }, none)).status).toBe(200);
    await mapsAreReady();
    expect(await mapDigests()).toEqual(own);
    const { tables } = valueTablesSchema.parse(await (await ask(listTables)).json());
    expect(tables.map(({ number, stars, why: reason }) => [number, stars, reason])).toEqual([
      [2, 0, none.why],
      [1, 1, 'Lithium'],
    ]);
    await expect(query(`update adopted_value set source = 'x'`)).rejects.toThrow('not changed');
  });

  it('may be tried first: the preview gives the limit of the run that follows, and stores nothing', async () => {
    const star = await StarRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const value = { ageMyr: 300, ageLowerMyr: 250, ageUpperMyr: 350 };
    const choice = { kind: 'value', value, source: 'Gyrochronology, a later paper' };
    const other = await StarRow.findOne({ where: { name: 'Star 1' }, rejectOnEmpty: true });
    const choices = [
      { starId: star.id, choice },
      { starId: other.id, choice },
    ];
    const older = await runBoth();
    const asked = await ask(previewAdoption, {}, { quantity: 'age', choices });
    const preview = adoptionPreviewSchema.parse(await asked.json());
    expect(preview).toMatchObject({ lead: { key: `A-${both.number}` }, stars: 2, missing: null });
    // Maps of the run are stored in 16 bits: 1 in 65535 a node.
    expect(preview.before).toBeCloseTo(older.result?.answer.limit ?? 0, 4);
    expect(valueTablesSchema.parse(await (await ask(listTables)).json()).tables).toHaveLength(2);

    const many = { quantity: 'age', choices, why: 'Rotation' };
    const made = await ask(adoptMany, {}, many);
    expect(made.status).toBe(201);
    const [table] = valueTablesSchema.parse(await made.json()).tables;
    expect([table.number, table.stars, table.changes.length]).toEqual([3, 2, 2]);
    await mapsAreReady();
    const newer = await runBoth();
    expect(newer.inputs?.adopted).toEqual([{ quantity: 'age', table: 3, stars: 2 }]);
    expect(preview.after).toBeCloseTo(newer.result?.answer.limit ?? 0, 4);
    expect(Math.abs((preview.after ?? 0) - (preview.before ?? 0))).toBeGreaterThan(1e-3);

    const back = choices.map(({ starId }) => ({ starId, choice: { kind: 'none' } }));
    await ask(adoptMany, {}, { quantity: 'age', choices: back, why: 'To go on' });
    const twice = [choices[0], choices[0]];
    const refused = await ask(adoptMany, {}, { quantity: 'age', choices: twice, why: 'x' });
    expect(refused.status).toBe(422);
    await mapsAreReady();
  });

  it('refuse a value with its bounds in another order, and an entry of another star', async () => {
    const star = await StarRow.findOne({ where: { name: 'Star 2' }, rejectOnEmpty: true });
    const value = { ageMyr: 30, ageLowerMyr: 40 };
    const wrong = { quantity: 'age', choice: { kind: 'value', value, source: 'x' }, why: 'y' };
    expect((await ask(adopt, { star: star.id }, wrong)).status).toBe(422);
    const foreign = await TargetRow.findOne({ where: { name: 'Star 1' }, rejectOnEmpty: true });
    const choice = { kind: 'entry', targetId: foreign.id };
    const other = await ask(adopt, { star: star.id }, { quantity: 'age', choice, why: 'y' });
    expect(other.status).toBe(404);
  });
});
