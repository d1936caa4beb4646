import { afterAll, vi } from 'vitest';
import { forgetConfig } from '@/lib/config';
import { testBundleFolder } from '@/lib/local/test-database.mjs';
import { createTestDatabase, dropTestDatabase } from './database';

// Several files share the modules of one process: what the last one set is taken back.
vi.unstubAllEnvs();
forgetConfig();
// Before the test file is imported, so that a module may read the address as early as it likes.
const database = await createTestDatabase();
process.env.DATABASE_URL = database.url;
process.env.RAREBOUND_BUNDLE_DIR = testBundleFolder;

// Registered first, hence run last: what the file's own hooks leave open is a leak.
afterAll(async () => {
  await dropTestDatabase(database);
});
