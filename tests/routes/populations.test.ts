import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  GET as getOne,
  PATCH as share,
} from '@/app/api/v1/collaborations/[collaboration]/populations/[population]/route';
import { POST as createVersion } from '@/app/api/v1/collaborations/[collaboration]/populations/[population]/versions/route';
import {
  POST as create,
  GET as list,
} from '@/app/api/v1/collaborations/[collaboration]/populations/route';
import { describePopulation } from '@/lib/inference';
import { type PopulationView, populationSchema } from '@/lib/schemas/populations';
import { digestOf } from '@/models/digest';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';

const { query } = withDatabase();

const definition = {
  form: 'power-law' as const,
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 20,
  semiMajorAxisMaxAu: 300,
  massIndex: -1.3,
  semiMajorAxisIndex: -0.6,
};

type Member = 'statistician' | 'student' | 'author';
let team: Awaited<ReturnType<typeof createCollaborationWith<Member>>>;
let headers: Record<Member, Record<string, string>>;

beforeAll(async () => {
  team = await createCollaborationWith(['statistician', 'student', 'author']);
  const of = async (member: Member) =>
    bearer(await tokenOf(team.people[member], team.collaboration));
  headers = {
    statistician: await of('statistician'),
    student: await of('student'),
    author: await of('author'),
  };
});
beforeEach(async () => {
  await query('delete from population');
  await query('delete from rate_limit');
});

const at = (population?: string): Record<string, string> => ({
  collaboration: team.collaboration.slug,
  ...(population === undefined ? {} : { population }),
});

async function saved(as: Member, body: Record<string, unknown> = {}): Promise<PopulationView> {
  const response = await call(create, {
    method: 'POST',
    params: at(),
    headers: headers[as],
    body: { name: 'Cold giants', convention: 'log', definition, ...body },
  });
  expect(response.status).toBe(201);
  return populationSchema.parse(await response.json());
}

const saveVersion = (as: Member, key: string, body: Record<string, unknown> = {}) =>
  call(createVersion, {
    method: 'POST',
    params: at(key),
    headers: headers[as],
    body: { convention: 'log', definition, ...body },
  });

const read = async (key: string, search = '') =>
  call(getOne, { path: `/${search}`, params: at(key), headers: headers.student });

describe('POST …/populations', () => {
  it('numbers populations from 1 and says them in words', async () => {
    const first = await saved('student');
    expect(first).toMatchObject({
      key: 'P-1',
      number: 1,
      version: 1,
      name: 'Cold giants',
      createdBy: team.people.student.name,
      isShared: false,
      usedBy: [],
      definition,
      words: describePopulation(definition),
    });
    expect((await saved('author')).key).toBe('P-2');
  });

  it('gives no number twice when several are saved at once', async () => {
    const all = await Promise.all(Array.from({ length: 6 }, () => saved('statistician')));
    expect(all.map(({ number }) => number).sort()).toEqual([1, 2, 3, 4, 5, 6]);
  });

  it('stores indices per natural logarithm, whichever convention they come in', async () => {
    const linear = await saved('student', {
      convention: 'linear',
      definition: { ...definition, massIndex: -2.31, semiMajorAxisIndex: -1.6 },
    });
    expect(linear.definition).toMatchObject({ massIndex: -1.31, semiMajorAxisIndex: -0.6 });
    const log = await saved('student', { definition: { ...definition, massIndex: -1.31 } });
    expect(linear.digest).toBe(log.digest);
  });

  it('takes its digest from the stored definition alone', async () => {
    const first = await saved('student', { name: 'One', note: 'a note' });
    const second = await saved('author', { name: 'Two' });
    expect(first.digest).toBe(digestOf(definition));
    expect(second.digest).toBe(first.digest);
    const other = await saved('author', { definition: { ...definition, massMaxMjup: 31 } });
    expect(other.digest).not.toBe(first.digest);
  });

  it.each([
    ['massMinMjup', 0, 'out-of-range'],
    ['massMinMjup', -2, 'out-of-range'],
    ['massMaxMjup', '30', 'not-a-number'],
    ['massMaxMjup', null, 'not-a-number'],
    ['semiMajorAxisMaxAu', undefined, 'value-missing'],
    ['massIndex', 11, 'out-of-range'],
    ['form', 'exponential', 'choice-unknown'],
  ])('refuses %s %j', async (field, value, code) => {
    const response = await call(create, {
      method: 'POST',
      params: at(),
      headers: headers.student,
      body: { name: 'x', convention: 'log', definition: { ...definition, [field]: value } },
    });
    expect(response.status).toBe(422);
    expect((await response.json()).errors[0]).toMatchObject({ code, item: `definition.${field}` });
  });

  it('guesses no convention', async () => {
    const response = await call(create, {
      method: 'POST',
      params: at(),
      headers: headers.student,
      body: { name: 'x', definition },
    });
    expect(response.status).toBe(422);
    expect((await response.json()).errors[0].item).toBe('convention');
  });

  it('lets nobody share who may not, and says who may', async () => {
    const response = await call(create, {
      method: 'POST',
      params: at(),
      headers: headers.author,
      body: { name: 'x', convention: 'log', definition, isShared: true },
    });
    expect(response.status).toBe(403);
    expect((await response.json()).needed).toEqual(['owner', 'statistician']);
    expect((await saved('statistician', { isShared: true })).isShared).toBe(true);
  });
});

describe('POST …/populations/{key}/versions', () => {
  it('adds a version and leaves the one before as it was', async () => {
    const first = await saved('student', { note: 'first' });
    const response = await saveVersion('student', first.key, {
      definition: { ...definition, massMaxMjup: 40 },
      note: 'wider',
    });
    expect(response.status).toBe(201);
    const second = await response.json();
    expect(second).toMatchObject({ key: 'P-1', version: 2, name: 'Cold giants', note: 'wider' });
    expect(second.id).not.toBe(first.id);
    expect(await (await read('P-1')).json()).toMatchObject({ version: 2 });
    const before = await (await read('P-1', '?version=1')).json();
    expect(before).toEqual({ ...first, can: { saveVersion: false, share: false } });
    expect((await read('P-1', '?version=3')).status).toBe(404);
  });

  it('gives versions that are saved at once different numbers', async () => {
    const { key } = await saved('statistician');
    const answers = await Promise.all([1, 2, 3].map(() => saveVersion('statistician', key)));
    const versions = await Promise.all(answers.map(async (one) => (await one.json()).version));
    expect(versions.sort()).toEqual([2, 3, 4]);
  });

  it('is open to a student for a draft of their own, until it is shared', async () => {
    const { key } = await saved('student');
    expect((await saveVersion('student', key)).status).toBe(201);
    expect((await saveVersion('author', key)).status).toBe(403);
    const shared = await call(share, {
      method: 'PATCH',
      params: at(key),
      headers: headers.statistician,
      body: { isShared: true },
    });
    expect(shared.status).toBe(200);
    const refused = await saveVersion('student', key);
    expect(refused.status).toBe(403);
    expect((await refused.json()).detail).toContain('Save it as a new population of your own');
    const next = await saveVersion('statistician', key);
    expect((await next.json()).isShared).toBe(true);
  });

  it('is what versionOf in a new population means', async () => {
    await saved('statistician');
    const second = await saved('statistician', { name: 'Renamed', versionOf: 1 });
    expect(second).toMatchObject({ key: 'P-1', version: 2, name: 'Renamed' });
  });
});

describe('GET …/populations', () => {
  it('lists every version, newest first, and what each person may do with it', async () => {
    const { key } = await saved('student');
    await saveVersion('student', key);
    await saved('author');
    const response = await call(list, { params: at(), headers: headers.student });
    const { populations } = (await response.json()) as { populations: PopulationView[] };
    const shown = populations.map((one) => [one.key, one.version, one.can.saveVersion]);
    expect(shown).toEqual([
      ['P-2', 1, false],
      ['P-1', 2, true],
      ['P-1', 1, false],
    ]);
  });

  it('names the analyses that rest on a version', async () => {
    const { id } = await saved('student');
    await query(
      `insert into analysis (collaboration_id, number, name, recipe) values ($1, 31, 'x', $2)`,
      [team.collaboration.id, JSON.stringify({ populationId: id })],
    );
    expect(await (await read('P-1')).json()).toMatchObject({ usedBy: ['A-31'] });
  });

  it.each(['P-0', 'P-01', 'p-1', 'P-1x', '1', 'P-9999999999', 'A-1'])(
    'finds no %s',
    async (key) => {
      await saved('student');
      expect((await read(key)).status).toBe(404);
    },
  );
});
