import { beforeAll, describe, expect, it } from 'vitest';
import { GET as find } from '@/app/api/v1/collaborations/[collaboration]/search/route';
import { type SearchHit, searchAnswerSchema } from '@/lib/schemas/search';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';
import { buildSurvey, buildTarget } from '../support/sample';

const { query } = withDatabase();
interface Seat {
  headers: Record<string, string>;
  slug: string;
  id: string;
}
let team: Seat;
let others: Seat;

async function seat(): Promise<Seat> {
  const { collaboration, people } = await createCollaborationWith(['student']);
  const headers = bearer(await tokenOf(people.student, collaboration));
  return { headers, slug: collaboration.slug, id: collaboration.id };
}

const ask = ({ headers, slug }: Seat, q: string) =>
  call(find, { headers, params: { collaboration: slug }, path: `/?${new URLSearchParams({ q })}` });

async function hits(who: Seat, q: string): Promise<SearchHit[]> {
  const response = await ask(who, q);
  expect(response.status).toBe(200);
  return searchAnswerSchema.parse(await response.json()).hits;
}

const titles = (found: SearchHit[], kind: SearchHit['kind']) =>
  found.filter((hit) => hit.kind === kind).map(({ title }) => title);

beforeAll(async () => {
  team = await seat();
  others = await seat();
  const survey = await buildSurvey(team.id, { name: 'GANNET' });
  for (const name of ['RB 0012', 'RB 0001 2', 'HD 100_2', 'HD 10052'])
    await buildTarget(survey, { name, gaiaDr3Id: name === 'RB 0012' ? '5205416437' : null });
  const foreign = await buildSurvey(others.id, { name: 'GANNET' });
  await buildTarget(foreign, { name: 'RB 0012 B' });
});

describe('search', () => {
  it('finds by name whatever the spaces and the case, the very name first', async () => {
    expect(titles(await hits(team, 'rb0012'), 'target')).toEqual(['RB 0012']);
    expect(titles(await hits(team, 'rb 00'), 'star')).toEqual(['RB 0012', 'RB 0001 2']);
    expect((await hits(team, 'gannet'))[0]).toMatchObject({
      kind: 'survey',
      page: 'surveys/gannet',
    });
  });

  it('finds a star by the beginning of its Gaia number', async () => {
    expect(titles(await hits(team, '52054'), 'star')).toEqual(['RB 0012']);
    expect(titles(await hits(team, '05416'), 'star')).toEqual([]);
  });

  it('takes the signs of a pattern as they are', async () => {
    expect(titles(await hits(team, '100_2'), 'target')).toEqual(['HD 100_2']);
    expect(await hits(team, '%')).toEqual([]);
  });

  it('stays within the collaboration', async () => {
    expect(titles(await hits(others, 'rb'), 'target')).toEqual(['RB 0012 B']);
    const { status } = await ask({ ...team, slug: others.slug }, 'rb');
    expect(status).toBe(404);
  });

  it('refuses an empty question', async () => {
    expect((await ask(team, ' ')).status).toBe(400);
    const [{ count }] = await query<{ count: string }>('select count(*) from star');
    expect(Number(count)).toBe(5);
  });
});
