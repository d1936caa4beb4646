import { bundleScripts } from '@/lib/local/bundle.mjs';
import { prepareTestDatabase, testBundleFolder } from '@/lib/local/test-database.mjs';

/** Vitest's global set-up: `npm test` has prepared all this already, a run by hand has not. */
export default async function prepareOnce(): Promise<void> {
  if (process.env.TEST_DATABASE_URL) return;
  const { url } = await prepareTestDatabase({ outlivesThisProcess: true });
  process.env.TEST_DATABASE_URL = url;
  await bundleScripts(testBundleFolder);
}
