import { installDebianPackage } from './debian.mjs';
import { runCommand } from './environment.mjs';
import { findExportReaders, findReferencePrograms } from './reference-programs.mjs';

/** Installs what the step live-reference asks, where this person may; stilts with its Java not. */
runCommand(async () => {
  const programs = await findReferencePrograms();
  const readers = await findExportReaders();
  const missing = [...programs.missing, ...readers.missing];
  for (const name of new Set(missing.flatMap(({ packages }) => packages))) {
    await installDebianPackage(name, 'as a reference of the tests');
  }
  return 0;
});
