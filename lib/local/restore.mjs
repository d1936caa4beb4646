import path from 'node:path';
import { databaseTools } from './database-tools.mjs';
import { dataFolder, folderDigest, LauncherProblem, runCommand } from './environment.mjs';
import { askHolder } from './exclusive.mjs';
import { ensurePackages } from './packages.mjs';

/** `npm run restore -- FILE` */
runCommand(async () => {
  const [given] = process.argv.slice(2);
  if (!given) throw new LauncherProblem('Which backup? npm run restore -- FILE');
  await ensurePackages();
  if ((await askHolder(`start-${folderDigest(dataFolder())}`)) !== null) {
    throw new LauncherProblem('Rarebound is running here: stop it, and its other workers, first.');
  }
  const { restore } = await import('./database-copy.mjs');
  const tools = await databaseTools();
  try {
    const { manifest, replaced } = await restore({ ...tools, file: path.resolve(given) });
    const count = Object.keys(manifest.tables).length;
    process.stdout.write(
      `Restored as of ${manifest.madeAt}: ${count} tables with equal digests.\n${replaced === null ? '' : `What stood there is kept as the database ${replaced}, until the next restore.\n`}`,
    );
    return 0;
  } finally {
    await tools.close();
  }
});
