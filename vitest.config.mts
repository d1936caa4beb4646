import path from 'node:path';
import { defineConfig } from 'vitest/config';

const root = path.resolve(import.meta.dirname);
const project = (name: string, include: string[], extra: Record<string, unknown> = {}) => ({
  resolve: { alias: { '@': root } },
  test: { name, include, environment: 'node', ...extra },
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
      project('unit', ['tests/lib/**/*.test.ts', 'tests/components/**/*.test.ts']),
      project('reference', ['tests/reference/**/*.test.ts']),
      project('database', ['tests/database/**/*.test.ts', 'tests/routes/**/*.test.ts'], {
        ...ownDatabase,
        testTimeout: 60_000,
        hookTimeout: 60_000,
      }),
      project('workers', ['tests/workers/**/*.test.ts'], {
        ...ownDatabase,
        testTimeout: 180_000,
        hookTimeout: 120_000,
      }),
    ],
  },
});
