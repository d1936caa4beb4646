import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  GET as getOne,
  PATCH as nameStart,
} from '@/app/api/v1/collaborations/[collaboration]/cooling-tables/[table]/route';
import { GET as list } from '@/app/api/v1/collaborations/[collaboration]/cooling-tables/route';
import { coolingRelationSchema } from '@/lib/schemas/cooling';
import { builtInMagnitude } from '@/lib/sensitivity';
import { CoolingTableRow } from '@/models';
import { digestOf } from '@/models/digest';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildSurvey, buildTarget, SMALL_GRID } from '../support/sample';

const { query } = withDatabase();

type Role = 'statistician' | 'student';
let team: Awaited<ReturnType<typeof createCollaborationWith<Role>>>;
let headers: Record<Role, Record<string, string>>;
let table: CoolingTableRow;

const numbers = {
  massMjup: [1, 10],
  ageMyr: [10, 100],
  magnitudes: { H: [14, 16, 9, null] },
};

beforeAll(async () => {
  team = await createCollaborationWith(['statistician', 'student']);
  const of = async (role: Role) => bearer(await tokenOf(team.people[role], team.collaboration));
  headers = { statistician: await of('statistician'), student: await of('student') };
  const { id: collaborationId } = team.collaboration;
  const fields = { collaborationId, name: 'Cold tracks', ...numbers };
  table = await CoolingTableRow.create({ ...fields, digest: digestOf(numbers) });
  const cooling = { kind: 'table', coolingTableId: table.id };
  const survey = await buildSurvey(collaborationId, {
    name: 'Sandbar',
    mapSettings: { ...SMALL_GRID, cooling },
  });
  await buildTarget(survey, { name: 'Inside' });
  await buildTarget(survey, { name: 'Old', ageMyr: 90, ageLowerMyr: 80, ageUpperMyr: 120 });
  await buildTarget(survey, { name: 'Without curve', ageMyr: 4, ageLowerMyr: null, curves: [] });
  await buildTarget(survey, { name: 'Young', ageMyr: 5, ageLowerMyr: null, ageUpperMyr: null });
  await buildSurvey(collaborationId, { name: 'Halyard' });
});
beforeEach(() => query('delete from rate_limit'));

const at = (id: string) => ({ collaboration: team.collaboration.slug, table: id });
async function read(id: string) {
  const response = await call(getOne, { params: at(id), headers: headers.student });
  expect(response.status).toBe(200);
  return coolingRelationSchema.parse(await response.json());
}
const name = (role: Role, startCondition: string, id = table.id) =>
  call(nameStart, {
    method: 'PATCH',
    params: at(id),
    headers: headers[role],
    body: { startCondition },
  });

describe('cooling relations', () => {
  it('hold their numbers, where they are used, and the targets that they do not cover', async () => {
    expect(await read(table.id)).toMatchObject({
      name: 'Cold tracks',
      startCondition: 'unstated',
      isApproximate: false,
      ...numbers,
      usedBy: [
        {
          slug: 'sandbar',
          targets: 3,
          outside: [
            { name: 'Old', lowerMyr: 80, upperMyr: 120 },
            { name: 'Young', lowerMyr: 5, upperMyr: 5 },
          ],
        },
      ],
    });
  });

  it('include the built-in law, which is approximate', async () => {
    const law = await read('built-in');
    expect(law.isApproximate).toBe(true);
    expect(law.usedBy.map(({ slug }) => slug)).toEqual(['halyard']);
    const ages = law.ageMyr.length;
    const at5 = law.massMjup.indexOf(5);
    expect(law.magnitudes.H[at5 * ages + 10]).toBe(builtInMagnitude(5, law.ageMyr[10], 'H'));
  });

  it('are named by their start, by those who may import them', async () => {
    expect((await name('student', 'cold')).status).toBe(403);
    expect((await name('statistician', 'tepid')).status).toBe(422);
    expect((await name('statistician', 'cold', 'built-in')).status).toBe(404);
    const named = await name('statistician', 'cold');
    expect(await named.json()).toMatchObject({ startCondition: 'cold', ...numbers });
    const params = { collaboration: team.collaboration.slug };
    const listed = await (await call(list, { params, headers: headers.student })).json();
    expect(listed.coolingTables[0]).toMatchObject({ startCondition: 'cold', digest: table.digest });
  });
});
