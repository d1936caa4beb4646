import { findReferencePrograms } from './reference-programs.mjs';
import { runVitest, testEnvironment } from './test-checks.mjs';

/** @typedef {import('./test-counts.mjs').Count} Count */

/**
 * What is said of checks that could not be made.
 *
 * @param {import('./reference-programs.mjs').FoundPrograms['missing']} missing
 * @returns {string[]} one sentence a program
 */
export function describeNotRun(missing) {
  return missing.map(({ program, packages }) => {
    const names = packages.join(' ');
    return (
      `the checks against ${program}: not installed ${packages.length > 1 ? 'are' : 'is'} ${names} ` +
      `("apt-get install -y --no-install-recommends ${names}" as root)`
    );
  });
}

/**
 * Checks against the programs that are installed. One that is missing is named, and fails the step
 * where the environment says CI=true: there nobody would read that something did not run.
 *
 * @returns {Promise<Count & { notRun: string[] }>}
 */
export async function checkLiveReference(/** @type {string} */ reportFile) {
  const { R, SciPy, missing } = await findReferencePrograms();
  const notRun = describeNotRun(missing);
  const nothing = { passed: 0, failed: 0, notes: [] };
  const counted =
    R === null && SciPy === null
      ? nothing
      : await runVitest('live-reference', { reportFile, environment: testEnvironment() });
  if (process.env.CI !== 'true' || missing.length === 0) return { ...counted, notRun };
  const { passed, failed, notes } = counted;
  return {
    passed,
    failed: failed + missing.length,
    notes: [...notes, ...notRun.map((what) => `Did not run: ${what}`)],
    notRun: [],
  };
}
