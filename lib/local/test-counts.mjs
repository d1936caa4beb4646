/**
 * What one step of the tests came to.
 *
 * @typedef {{ passed: number, failed: number, notes: string[] }} Count
 */

/** @returns {Count} a count in which a step that ran nothing has failed */
function refuseEmpty(/** @type {Count} */ count) {
  if (count.passed + count.failed > 0) return count;
  return { passed: 0, failed: 1, notes: ['No test ran'] };
}

/** @returns {Count} one passed or one failed, for a step that has no tests of its own */
export function countCommand(/** @type {{ code: number, output: string }} */ { code, output }) {
  return code === 0
    ? { passed: 1, failed: 0, notes: [] }
    : { passed: 0, failed: 1, notes: [output.trim()] };
}

/**
 * Counts Vitest's JSON report. A file that does not load has no tests in it and counts as one
 * failure, and so does a test that was set aside.
 *
 * @param {any} report
 * @param {number} code exit code of the run
 * @returns {Count}
 */
export function countVitest(report, code) {
  const unloaded = report.testResults.filter(
    (file) =>
      file.status === 'failed' && !file.assertionResults.some(({ status }) => status === 'failed'),
  );
  const setAside = report.numPendingTests + report.numTodoTests;
  const notes = [
    ...unloaded.map(({ name, message }) => `${name}\n${message}`),
    ...(setAside > 0 ? [`${setAside} tests were set aside; a test runs or is taken out`] : []),
  ];
  const counted = {
    passed: report.numPassedTests,
    failed: report.numFailedTests + unloaded.length + setAside,
    notes,
  };
  if (code !== 0 && counted.failed === 0) {
    return { ...counted, failed: 1, notes: [`Vitest ended with exit code ${code}`] };
  }
  return refuseEmpty(counted);
}

/**
 * Counts Playwright's JSON report; a test that passed only when repeated has failed.
 *
 * @param {any} report
 * @param {number} code
 * @returns {Count}
 */
export function countPlaywright(report, code) {
  const { expected, unexpected, flaky, skipped } = report.stats;
  const notes = report.errors.map(({ message }) => message);
  const failed = unexpected + flaky + skipped + report.errors.length;
  if (code !== 0 && failed === 0) {
    return { passed: expected, failed: 1, notes: [`Playwright ended with exit code ${code}`] };
  }
  return refuseEmpty({ passed: expected, failed, notes });
}

/**
 * Counts dependency-cruiser's JSON report. Without a TypeScript compiler that it knows it reads no
 * `.ts` file at all and finds nothing wrong, hence the second condition.
 *
 * @param {any} report
 * @returns {Count}
 */
export function countRanks(report) {
  const read = report.modules.filter(({ source }) => /\.tsx?$/.test(source)).length;
  if (read === 0) return { passed: 0, failed: 1, notes: ['No TypeScript file was read'] };
  const notes = report.summary.violations
    .filter(({ rule }) => rule.severity === 'error')
    .map(({ rule, from, to }) => `${rule.name}: ${from} imports ${to}`);
  return notes.length === 0 ? { passed: 1, failed: 0, notes } : { passed: 0, failed: 1, notes };
}

/** @returns {Count} one passed when npm can install from this lockfile wherever its registry is */
export function countLockfile(/** @type {string} */ text) {
  const lines = text.split('\n').filter((line) => line.includes('"resolved"'));
  if (lines.length === 0) return { passed: 1, failed: 0, notes: [] };
  const note = `package-lock.json names ${lines.length} download addresses, first ${lines[0].trim()}`;
  return { passed: 0, failed: 1, notes: [note] };
}

/** @returns {Count} */
export function addCounts(/** @type {Count[]} */ counts) {
  return {
    passed: counts.reduce((sum, { passed }) => sum + passed, 0),
    failed: counts.reduce((sum, { failed }) => sum + failed, 0),
    notes: counts.flatMap(({ notes }) => notes),
  };
}
