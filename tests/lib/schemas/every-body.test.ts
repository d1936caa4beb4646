import { describe, expect, it } from 'vitest';
import { InputError } from '@/lib/errors';
import { apiRoutes } from '@/lib/schemas/api-routes';
import { parseInput } from '@/lib/schemas/input';
import { mutated, mutationsOf, sampleOf, shapeOf } from '../../support/mutated-bodies';

const bodies = apiRoutes.flatMap(({ method, path, body }) =>
  body ? [[`${method} ${path}`, body] as const] : [],
);

/** What the refusal says of a body, or nothing where it is taken. */
function faultsOf(schema: (typeof bodies)[number][1], body: unknown): string[] | null {
  try {
    parseInput(schema, body);
    return null;
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    expect([400, 422]).toContain(error.status);
    return error.faults.map(({ item }) => item ?? '');
  }
}

/** Faults stand at the field, below it, or at the choice of forms that holds it. */
const isAbout = (item: string, path: string) =>
  item === 'body' ||
  item
    .split(', ')
    .some((one) => one === path || one.startsWith(`${path}.`) || path.startsWith(`${one}.`));

describe('each field of each body, absent, null, of another type, huge, or one too many', () => {
  it.each(bodies)('is refused by its name: %s', (_, schema) => {
    const shape = shapeOf(schema);
    const sample = sampleOf(shape);
    const mutations = mutationsOf(shape);
    expect(mutations.length).toBeGreaterThan(0);
    for (const mutation of mutations.filter(({ isRefused }) => isRefused)) {
      const at = mutation.path.join('.');
      const faults = faultsOf(schema, mutated(sample, mutation));
      expect(faults, `${at}, ${mutation.what}, is taken`).not.toBeNull();
      expect(
        faults?.some((item) => isAbout(item, at)),
        `${at}, ${mutation.what}: ${faults}`,
      ).toBe(true);
    }
  });
});
