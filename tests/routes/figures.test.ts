import { beforeAll, describe, expect, it } from 'vitest';
import { POST as asPdf } from '@/app/api/v1/collaborations/[collaboration]/figures/route';
import { withDatabase } from '../support/database';
import {
  bearer,
  createCollaborationWith,
  sessionCookieOf,
  tokenOf,
  webAddress,
} from '../support/people';

withDatabase();
const figure = (content: string) =>
  `<svg xmlns="http://www.w3.org/2000/svg" width="180mm" viewBox="0 0 884 400"><title>A-31</title>${content}</svg>`;

let team: Awaited<ReturnType<typeof createCollaborationWith<'owner' | 'student'>>>;
let student: Record<string, string>;

beforeAll(async () => {
  team = await createCollaborationWith(['owner', 'student']);
  student = bearer(await tokenOf(team.people.student, team.collaboration));
});

function post(body: string, given: Record<string, string> = {}, slug = team.collaboration.slug) {
  const headers = new Headers({ 'content-type': 'image/svg+xml', ...student, ...given });
  if (headers.get('authorization') === '') headers.delete('authorization');
  const request = new Request(`${webAddress()}/figures`, {
    method: 'POST',
    headers,
    body,
  });
  return asPdf(request, { params: Promise.resolve({ collaboration: slug }) });
}

describe('POST figures', () => {
  it('answers a figure as PDF, the same bytes each time', async () => {
    const words = figure('<text x="14" y="20" font-size="13" fill="#0b2326">α &lt;5.8 %</text>');
    const [first, second] = [await post(words), await post(words)];
    expect(first.status).toBe(200);
    expect(first.headers.get('content-type')).toBe('application/pdf');
    const bytes = Buffer.from(await first.arrayBuffer());
    expect(bytes.subarray(0, 5).toString()).toBe('%PDF-');
    expect(bytes.equals(Buffer.from(await second.arrayBuffer()))).toBe(true);
  });

  it.each([
    ['markup that is no mark', figure('<foreignObject/>'), 422],
    ['more than 4 MiB', figure(' '.repeat(5 * 2 ** 20)), 413],
    ['40 001 elements', figure('<g/>'.repeat(40_001)), 422],
  ])('refuses %s', async (_, body, status) => {
    const response = await post(body);
    expect(response.status).toBe(status);
    expect(response.headers.get('content-type')).toContain('problem+json');
  });

  it('refuses another content type, another site and a stranger', async () => {
    expect((await post(figure(''), { 'content-type': 'text/plain' })).status).toBe(415);
    const other = await createCollaborationWith(['owner']);
    expect((await post(figure(''), {}, other.collaboration.slug)).status).toBe(404);
    expect((await post(figure(''), { authorization: '' })).status).toBe(401);
    const { cookie } = await sessionCookieOf(team.people.student);
    const foreign = { authorization: '', cookie, origin: 'https://a.example' };
    expect((await post(figure(''), foreign)).status).toBe(403);
  });
});
