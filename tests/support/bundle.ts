import path from 'node:path';
import { testBundleFolder } from '@/lib/local/test-database.mjs';

/**
 * The bundled file of an entry, for tests that start processes or threads.
 *
 * @example bundledFile('workers/main.ts') // …/dist/test/workers/main.js
 */
export function bundledFile(entry: string): string {
  return path.resolve(testBundleFolder, entry.replace(/\.ts$/, '.js'));
}
