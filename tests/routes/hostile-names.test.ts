import { parse } from 'csv-parse/sync';
import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { beforeAll, describe, expect, it } from 'vitest';
import { SectionOpener } from '@/components/ui/section-opener';
import { mailKinds } from '@/lib/mail/kinds';
import { writeLetter } from '@/lib/mail/letter';
import { withDatabase } from '../support/database';
import { bearer, tokenOf } from '../support/people';
import type { RoutePermission } from '../support/route-permissions';
import { buildWholeLab, type LabIds, type WholeLab } from '../support/whole-lab';
import { askLab, labRoutes } from '../support/whole-lab-requests';

withDatabase();
let lab: WholeLab;
let headers: Record<string, string>;

beforeAll(async () => {
  lab = await buildWholeLab(41);
  headers = bearer(await tokenOf(lab.people.owner, lab.collaboration));
});

// At most 60 characters each: the shortest field takes no more.
const NAMES = [
  '<img src=x onerror=alert(1)>',
  '<script>alert(1)</script>&amp;',
  `\${7*7} {{7*7}} <%= 7*7 %>`,
  "'; drop table star; --",
  '=cmd|calc!A1',
  'سطح ليلى ב',
  '💫'.repeat(25),
  'e\u0301\u0323 \u00a0\u200dx',
];

async function ask(name: string, given: Partial<RoutePermission> = {}) {
  const route = labRoutes.find((one) => one.name === name);
  if (!route) throw new Error(`no route ${name}`);
  const permission = { ...route.permission, ...given };
  const { slug } = lab.collaboration;
  return askLab({ ...route, permission }, { slug, ids: lab.ids, headers });
}

/** Where a name goes in, with the body that carries it. */
const fields: [string, (name: string, ids: LabIds) => object][] = [
  [
    'post /surveys',
    (name) => ({
      name,
      slug: `named-${NAMES.indexOf(name)}`,
      band: 'H',
      description: name,
    }),
  ],
  ['post /samples', (name) => ({ name, definition: {} })],
  [
    'post /exercises',
    (title, { run }) => ({ title, task: title, runId: run, mayChange: ['prior'] }),
  ],
  ['post /analyses/{analysis}/copy', (name) => ({ name })],
  ['patch /targets/{target}', (leftOutReason) => ({ leftOutReason })],
  ['post /notes', (body, { survey }) => ({ on: { kind: 'survey', key: survey }, body })],
  ['post /candidates/{candidate}/verdicts', (reason) => ({ status: 'ambiguous', reason })],
  ['patch ', (name) => ({ name })],
];

/** Every text within an answer. */
function textsIn(value: unknown): string[] {
  if (typeof value === 'string') return [value];
  if (typeof value !== 'object' || value === null) return [];
  return Object.values(value).flatMap(textsIn);
}

describe.each(fields)('%s', (route, bodyOf) => {
  it.each(NAMES)('gives %s back as it was, or refuses it by its field', async (name) => {
    const response = await ask(route, { body: (ids) => bodyOf(name, ids) });
    const answer = await response.json();
    if (response.status === 422) {
      expect(answer.errors[0].item).toBeTruthy();
      return;
    }
    expect(response.status, JSON.stringify(answer).slice(0, 200)).toBeLessThan(300);
    const texts = textsIn(answer).map((text) => text.normalize('NFC'));
    expect(texts).toContain(name.normalize('NFC'));
  });
});

describe('names that were taken', () => {
  it('stand in the log’s file as one cell each, none of them a formula', async () => {
    const bytes = Buffer.from(await (await ask('get /audit/export')).arrayBuffer());
    const rows = parse(bytes, { bom: true, relax_column_count: false }) as string[][];
    expect(rows.length).toBeGreaterThan(NAMES.length);
    for (const cell of rows.flat()) expect(cell).not.toMatch(/^[=+@\t\r]/);
  });

  it.each(NAMES)('are text in a page and in a letter: %s', (name) => {
    const markup = renderToStaticMarkup(createElement(SectionOpener, { title: name }));
    const letter = writeLetter(
      mailKinds.mention.compose({ collaboration: name, who: name, item: name, path: '/a' }),
      { words: 'Nothing follows.' },
    );
    for (const html of [markup, letter.html]) expect(html).not.toMatch(/<(img|script)/);
    expect(letter.subject).not.toMatch(/[\r\n]/);
    expect(letter.text).toContain(name);
  });
});
