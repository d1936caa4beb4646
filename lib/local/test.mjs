import { runCommand } from './environment.mjs';
import { ensurePackages } from './packages.mjs';
import { prepareTestDatabase, stopTestDatabase } from './test-database.mjs';

runCommand(async () => {
  const args = process.argv.slice(2);
  await ensurePackages();
  if (args.includes('--stop')) {
    const stopped = await stopTestDatabase();
    process.stdout.write(
      stopped ? 'The test database was stopped\n' : 'No test database was running\n',
    );
    return 0;
  }
  const { url } = await prepareTestDatabase();
  process.stdout.write(`${url}\n`);
  return 0;
});
