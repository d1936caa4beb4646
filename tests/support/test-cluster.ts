import { prepareTestDatabase } from '@/lib/local/test-database.mjs';

/** Vitest's global set-up: `npm test` has prepared the cluster already, a run by hand has not. */
export default async function prepareOnce(): Promise<void> {
  if (process.env.TEST_DATABASE_URL) return;
  const { url } = await prepareTestDatabase();
  process.env.TEST_DATABASE_URL = url;
}
