import { bundleScripts } from './bundle.mjs';
import { runCommand } from './environment.mjs';
import { ensurePackages } from './packages.mjs';
import { buildWeb, isBuildFresh } from './web-build.mjs';

/** `npm run build`: all that `npm start` and `npm run worker` would make at their first start. */
runCommand(async () => {
  await ensurePackages();
  await bundleScripts('dist');
  if (!isBuildFresh('.next')) await buildWeb('.next');
  return 0;
});
