import path from 'node:path';
import { defineConfig } from 'vitest/config';

const root = path.resolve(import.meta.dirname);
// A ceiling against hanging, not a benchmark: the machine may be busy with something else.
const ceilings = { testTimeout: 60_000, hookTimeout: 60_000 };

const project = (name: string, include: string[], extra: Record<string, unknown> = {}) => ({
  resolve: { alias: { '@': root } },
  test: { name, include, environment: 'node', ...ceilings, ...extra },
});

/** Each test file gets a database of its own, before it is imported. */
const ownDatabase = {
  globalSetup: [path.join(root, 'tests/support/test-cluster.ts')],
  setupFiles: [path.join(root, 'tests/support/each-database.ts')],
};

/** One project per kind of test, so that the runner can count and order them. */
export default defineConfig({
  test: {
    maxWorkers: 2,
    projects: [
      project('unit', ['tests/lib/**/*.test.ts', 'tests/components/**/*.test.ts'], {
        isolate: false,
      }),
      // Pure functions against outside values: no state that one file could leave to the next.
      project('reference', ['tests/reference/**/*.test.ts'], { isolate: false }),
      // Other programs, asked anew: the step of that name finds out which are installed.
      project('live-reference', ['tests/live-reference/**/*.test.ts']),
      project(
        'database',
        ['tests/database/**/*.test.ts', 'tests/routes/**/*.test.ts'],
        ownDatabase,
      ),
      project('workers', ['tests/workers/**/*.test.ts'], {
        ...ownDatabase,
        testTimeout: 180_000,
        hookTimeout: 120_000,
      }),
    ],
  },
});
