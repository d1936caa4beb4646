import { findExportReaders, findReferencePrograms } from './reference-programs.mjs';
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

/** What stilts would add; its Java is too much to ask of everybody. */
const WITHOUT_STILTS =
  'the look of stilts at exported tables, since stilts is not installed (350 MB with Java; ' +
  '"apt-get install -y --no-install-recommends stilts" as root)';

/**
 * Checks against the programs that are installed; one that is missing is named.
 *
 * @returns {Promise<Count & { notRun: string[] }>}
 */
export async function checkLiveReference(/** @type {string} */ reportFile) {
  const [programs, readers] = await Promise.all([findReferencePrograms(), findExportReaders()]);
  const count = await runVitest('live-reference', { reportFile, environment: testEnvironment() });
  const missing = [...programs.missing, ...readers.missing];
  const counted = countNotRun(count, missing, process.env.CI === 'true');
  if (readers.hasStilts) return counted;
  return { ...counted, notRun: [...counted.notRun, WITHOUT_STILTS] };
}
