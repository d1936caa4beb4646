import { installDebianPackage } from './debian.mjs';
import { runCommand } from './environment.mjs';
import { findReferencePrograms } from './reference-programs.mjs';

/** Installs what the step live-reference asks, where this person may. */
runCommand(async () => {
  const { missing } = await findReferencePrograms();
  for (const name of missing.flatMap(({ packages }) => packages)) {
    await installDebianPackage(name, 'as a reference of the tests');
  }
  return 0;
});
