import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { databaseTools } from './database-tools.mjs';
import { dataFolder, runCommand } from './environment.mjs';
import { ensurePackages } from './packages.mjs';

/** `npm run backup [-- FILE]` */
runCommand(async () => {
  await ensurePackages();
  const { backUp } = await import('./database-copy.mjs');
  const [given] = process.argv.slice(2);
  const stamp = new Date().toISOString().replace(/[:.]/g, '-');
  const file = path.resolve(given ?? path.join(dataFolder(), 'backups', `rarebound-${stamp}.dump`));
  mkdirSync(path.dirname(file), { recursive: true, mode: 0o700 });
  const tools = await databaseTools();
  try {
    const { tables, sha256 } = await backUp({ ...tools, file });
    const rows = Object.values(tables).reduce((sum, table) => sum + table.rows, 0);
    process.stdout.write(
      `${file}\n${Object.keys(tables).length} tables, ${rows} rows, SHA-256 ${sha256}\nIts digests lie beside it as ${path.basename(file)}.json: keep both, away from this machine.\n`,
    );
    return 0;
  } finally {
    await tools.close();
  }
});
