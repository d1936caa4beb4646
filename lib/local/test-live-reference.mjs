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
    const verb = packages.length > 1 ? 'are' : 'is';
    return (
      `the checks against ${program}, since ${packages.join(', ')} ${verb} not installed ` +
      `("apt-get install -y --no-install-recommends ${names}" as root)`
    );
  });
}

/**
 * A count with what did not run. Where the environment says CI=true nobody would read that, so that
 * a missing program is a failure there.
 *
 * @param {Count} count
 * @param {import('./reference-programs.mjs').FoundPrograms['missing']} missing
 * @param {boolean} isContinuous
 * @returns {Count & { notRun: string[] }}
 */
export function countNotRun(count, missing, isContinuous) {
  const notRun = describeNotRun(missing);
  if (!isContinuous) return { ...count, notRun };
  return {
    passed: count.passed,
    failed: count.failed + missing.length,
    notes: [...count.notes, ...notRun.map((what) => `Did not run: ${what}`)],
    notRun: [],
  };
}

/**
 * Checks against the programs that are installed; one that is missing is named.
 *
 * @returns {Promise<Count & { notRun: string[] }>}
 */
export async function checkLiveReference(/** @type {string} */ reportFile) {
  const { R, SciPy, missing } = await findReferencePrograms();
  const count =
    R === null && SciPy === null
      ? { passed: 0, failed: 0, notes: [] }
      : await runVitest('live-reference', { reportFile, environment: testEnvironment() });
  return countNotRun(count, missing, process.env.CI === 'true');
}
