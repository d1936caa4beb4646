import { createElement } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { expect, it } from 'vitest';
import { OperationEntry } from '@/components/api/operation-entry';
import { buildGuide, guideShapes, searchGuide } from '@/lib/schemas/api-guide';
import { apiProblems } from '@/lib/schemas/api-problems';
import { apiRoutes } from '@/lib/schemas/api-routes';
import { buildOpenApi } from '@/lib/schemas/openapi';

const origin = 'http://laboratory.example';
const document = buildOpenApi(origin);
const groups = buildGuide(document, origin);
const operations = groups.flatMap((group) => group.operations);
const operationAt = (name: string) => {
  const found = operations.find(({ method, path }) => `${method} ${path}`.endsWith(name));
  if (!found) throw new Error(`no operation ${name}`);
  return found;
};

it('has every route once, with a noun that can stand in an address', () => {
  expect(operations).toHaveLength(apiRoutes.length);
  expect(new Set(operations.map(({ id }) => id)).size).toBe(apiRoutes.length);
  for (const { noun } of groups) expect(noun).toMatch(/^[a-z-]+$/);
  expect(groups.map(({ noun }) => noun)).not.toContain('shapes');
});

it('leads to shapes and refusals that have a place', () => {
  const shapes = new Set(guideShapes(document).map(({ name }) => name));
  const statuses = new Set(apiProblems.map(({ status }) => status));
  for (const { body, answer, parameters, refusals, id } of operations) {
    for (const { shape } of [...body, ...answer, ...parameters]) {
      if (shape !== null) expect(shapes, id).toContain(shape);
    }
    for (const status of refusals) expect(statuses, id).toContain(status);
  }
});

it('lists the fields of a body with what they need', () => {
  const { body, parameters, answer } = operationAt(
    'POST /api/v1/collaborations/{collaboration}/surveys',
  );
  expect(body.find(({ name }) => name === 'name')).toMatchObject({
    type: 'text',
    isRequired: true,
  });
  expect(body.find(({ name }) => name === 'description')).toMatchObject({ isRequired: false });
  expect(parameters.map(({ name }) => name)).toEqual(['collaboration', 'Idempotency-Key']);
  expect(answer).toEqual([expect.objectContaining({ shape: 'Survey' })]);
});

it('says of a field that several shapes have every type that it may have', () => {
  const { body } = operationAt('POST /api/v1/collaborations/{collaboration}/analyses');
  const law = body.find(({ name }) => name === 'recipe.prior.law');
  expect(law).toMatchObject({ isRequired: true });
  for (const one of ['"uniform"', '"log-uniform"', '"gamma"']) expect(law?.type).toContain(one);
  expect(body.find(({ name }) => name === 'recipe.prior.min')).toMatchObject({ isRequired: false });
});

it('finds an operation by words in any order', () => {
  const found = searchGuide(groups, 'exports SURVEY');
  const paths = found.flatMap((group) => group.operations.map(({ path }) => path));
  expect(paths).toContain('/api/v1/collaborations/{collaboration}/surveys/{survey}/exports');
  expect(searchGuide(groups, 'no-such-word')).toEqual([]);
  expect(searchGuide(groups, ' ')).toHaveLength(groups.length);
});

it('draws each operation with its address, its scope and its example', () => {
  for (const operation of operations) {
    const html = renderToStaticMarkup(createElement(OperationEntry, { operation }));
    expect(html).toContain(`id="${operation.id}"`);
    expect(html.replaceAll('<wbr/>', '')).toContain(operation.path);
    expect(html.includes('import urllib.request')).toBe(operation.access !== 'session');
    if (operation.access === 'run') expect(html).toContain('needs the scope run');
  }
});
