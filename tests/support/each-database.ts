import { afterAll } from 'vitest';
import { testBundleFolder } from '@/lib/local/test-database.mjs';
import { createTestDatabase, dropTestDatabase } from './database';

// Before the test file is imported, so that a module may read the address as early as it likes.
const database = await createTestDatabase();
process.env.DATABASE_URL = database.url;
process.env.RAREBOUND_BUNDLE_DIR = testBundleFolder;

// Registered first, hence run last: what the file's own hooks leave open is a leak.
afterAll(async () => {
  await dropTestDatabase(database);
});
