import path from 'node:path';
import { defineConfig } from 'vitest/config';

const root = path.resolve(import.meta.dirname);
// A ceiling against hanging, not a benchmark: the machine may be busy with something else.
const ceilings = { testTimeout: 60_000, hookTimeout: 60_000 };

const project = (name: string, include: string[], extra: Record<string, unknown> = {}) => ({
  resolve: { alias: { '@': root } },
  test: { name, include, environment: 'node', ...ceilings, ...extra },
});

/**
 * Each test file gets a database of its own, before it is imported; the modules are loaded once a
 * process, which takes longer than most of the tests.
 */
const ownDatabase = {
  isolate: false,
  globalSetup: [path.join(root, 'tests/support/test-cluster.ts')],
  setupFiles: [path.join(root, 'tests/support/each-database.ts')],
};

/** These replace a module, which a process that has loaded it already would not notice. */
const replacing = ['tests/routes/people-sign-in.test.ts'];

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
      project('database', ['tests/database/**/*.test.ts', 'tests/routes/**/*.test.ts'], {
        ...ownDatabase,
        exclude: replacing,
      }),
      project('database-alone', replacing, { ...ownDatabase, isolate: true }),
      project('workers', ['tests/workers/**/*.test.ts'], {
        ...ownDatabase,
        // Much of it is waiting for the leases of workers that were killed.
        maxWorkers: 3,
        sequence: { groupOrder: 1 },
        testTimeout: 180_000,
        hookTimeout: 120_000,
      }),
    ],
  },
});
