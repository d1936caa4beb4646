import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { GET as getOne } from '@/app/api/v1/collaborations/[collaboration]/populations/[population]/route';
import {
  POST as create,
  GET as list,
} from '@/app/api/v1/collaborations/[collaboration]/populations/route';
import { POST as storeUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/[upload]/store/route';
import { POST as sendUpload } from '@/app/api/v1/collaborations/[collaboration]/uploads/route';
import { populationListSchema } from '@/lib/schemas/population-versions';
import { populationSchema } from '@/lib/schemas/populations';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf, webAddress } from '../support/people';

const { query } = withDatabase();
const box = { massMinMjup: 1, massMaxMjup: 20, semiMajorAxisMinAu: 5, semiMajorAxisMaxAu: 200 };
const shaped = {
  form: 'shaped',
  ...box,
  mass: { shape: 'broken-power-law', breakAt: 5, innerIndex: -1.3, outerIndex: -2.5 },
  semiMajorAxis: { shape: 'power-law', index: 0.26 },
};
const systems = {
  form: 'systems',
  weight: [2, 1],
  companionSystem: [1, 1],
  massMjup: [2, 9],
  semiMajorAxisAu: [5, 40],
};

let team: Awaited<ReturnType<typeof createCollaborationWith<'author'>>>;
let headers: Record<string, string>;
beforeAll(async () => {
  team = await createCollaborationWith(['author']);
  headers = bearer(await tokenOf(team.people.author, team.collaboration));
});
beforeEach(async () => {
  await query('delete from population');
  await query('delete from rate_limit');
});
const at = (params: Record<string, string> = {}) => ({
  collaboration: team.collaboration.slug,
  ...params,
});
const save = (definition: unknown, stated: Record<string, unknown> = {}) =>
  call(create, {
    method: 'POST',
    params: at(),
    headers,
    body: { name: 'Shapes', convention: 'log', definition, ...stated },
  });
const listed = async () =>
  populationListSchema.parse(await (await call(list, { params: at(), headers })).json())
    .populations;

describe('POST …/populations', () => {
  it('stores shaped laws per natural logarithm, each axis from its own convention', async () => {
    const stated = { convention: 'linear', semiMajorAxisConvention: 'period' };
    const response = await save(shaped, stated);
    expect(response.status).toBe(201);
    const view = populationSchema.parse(await response.json());
    expect(view.definition).toMatchObject({
      mass: { innerIndex: -0.3, outerIndex: -1.5 },
      semiMajorAxis: { index: 0.39 },
    });
    expect(view.words).toContain('below 5 MJ');
  });

  it.each([
    [{ ...shaped, semiMajorAxis: { shape: 'log-normal', median: 40, sigmaDex: 0 } }, 'sigmaDex'],
    [{ ...shaped, semiMajorAxis: { shape: 'tabulated', at: [5, 4], perLog: [1, 1] } }, 'increase'],
    [{ ...shaped, hostScaling: { index: 1, referenceMsun: -1 } }, 'referenceMsun'],
    [{ ...systems, companionSystem: [1, 5] }, 'system 5'],
    [{ ...systems, massMjup: [2] }, 'as many masses as companions'],
    [{ ...systems, weight: [] }, 'weight'],
    [{ form: 'unknown' }, 'form'],
  ])('refuses %j and says where', async (definition, words) => {
    const response = await save(definition);
    expect([400, 422]).toContain(response.status);
    expect(JSON.stringify(await response.json())).toContain(words);
    expect(await listed()).toEqual([]);
  });

  it('keeps the companions of systems out of lists and whole in the population', async () => {
    expect((await save(systems)).status).toBe(201);
    const [{ definition, key, words }] = await listed();
    expect(definition).toEqual({
      form: 'systems',
      systems: 2,
      companions: 2,
      massMinMjup: 2,
      massMaxMjup: 9,
      semiMajorAxisMinAu: 5,
      semiMajorAxisMaxAu: 40,
    });
    const one = await call(getOne, { params: at({ population: key }), headers });
    const whole = populationSchema.parse(await one.json());
    expect(whole.definition).toEqual(systems);
    expect(whole.words).toBe(words);
  });
});

describe('an upload of systems', () => {
  const upload = async (bytes: string, settings: Record<string, unknown> = {}) => {
    const search = new URLSearchParams({
      kind: 'systems',
      name: 'synthetic.csv',
      settings: JSON.stringify(settings),
    });
    const request = new Request(new URL(`/?${search}`, webAddress()), {
      method: 'POST',
      headers: { 'content-type': 'application/octet-stream', ...headers },
      body: bytes,
    });
    return sendUpload(request, { params: Promise.resolve(at()) });
  };
  const file = 'system,weight,mass,semi_major_axis\na,2,,\nb,1,2,5\nb,1,9,40\n';

  it('is shown first, and stored as a population and then as a version of it', async () => {
    const read = await upload(file, { title: 'Synthetic' });
    expect(read.status).toBe(201);
    const { id, report } = await read.json();
    expect(report.summary).toBe('Population of 2 systems with 2 companions');
    expect(await listed()).toEqual([]);
    const stored = await call(storeUpload, {
      method: 'POST',
      params: at({ upload: id }),
      headers,
    });
    expect((await stored.json()).state).toBe('stored');
    const [population] = await listed();
    expect(population).toMatchObject({ key: 'P-1', version: 1, name: 'Synthetic' });
    const one = await call(getOne, { params: at({ population: 'P-1' }), headers });
    expect((await one.json()).definition).toEqual(systems);

    const wider = `${file}c,1,20,100\n`;
    const next = await (await upload(wider, { versionOf: 1, title: 'Synthetic' })).json();
    await call(storeUpload, { method: 'POST', params: at({ upload: next.id }), headers });
    expect((await listed()).map(({ key, version }) => [key, version])).toEqual([
      ['P-1', 2],
      ['P-1', 1],
    ]);
  });

  it('is refused with the line and column of its fault', async () => {
    const response = await upload('system,mass,semi_major_axis\na,2,\n');
    expect(response.status).toBe(422);
    const [fault] = (await response.json()).errors;
    expect(fault).toMatchObject({ code: 'value-missing', line: 2, column: 'semi_major_axis' });
  });
});
