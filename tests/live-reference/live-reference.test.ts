import { describe, expect, it } from 'vitest';
import { findReferencePrograms } from '@/lib/local/reference-programs.mjs';
import type { LiveCheck } from './check';
import { completenessChecks } from './completeness';
import { constantChecks } from './constants';
import { limitChecks } from './limits';
import { orbitChecks } from './orbits';
import { posteriorChecks } from './posteriors';
import { askPrograms, type ProgramAnswer } from './programs';
import { specialFunctionChecks } from './special-functions';

const checks = [
  ...specialFunctionChecks,
  ...limitChecks,
  ...posteriorChecks,
  ...orbitChecks,
  ...constantChecks,
  ...completenessChecks,
];

/** The largest difference of a row in units of what is allowed, with where it is. */
function compareRow(check: LiveCheck, row: number, theirs: ProgramAnswer): string[] {
  const { abs = 0, rel = 0, standardErrors = 0 } = check.tolerance;
  const ours = check.ours(row);
  const asked = JSON.stringify(check.rows[row]).slice(0, 300);
  if (ours.length !== theirs.value.length) {
    return [`${asked}: ${ours.length} numbers of ours, ${theirs.value.length} of theirs`];
  }
  return ours.flatMap((value, i) => {
    const theirValue = theirs.value[i];
    const drawn = standardErrors * (theirs.standardError?.[i] ?? 0);
    const allowed = abs + rel * Math.abs(theirValue) + drawn;
    if (Math.abs(value - theirValue) <= allowed) return [];
    return [`${asked} [${i}]: ours ${value}, theirs ${theirValue}, allowed ${allowed}`];
  });
}

describe('checks', () => {
  it.each(['R', 'SciPy'])('ask something of %s', (program) => {
    expect(checks.filter((check) => check.program === program).length).toBeGreaterThan(0);
  });
});

const found = await findReferencePrograms();
const answers = await askPrograms(found, checks);

for (const program of ['R', 'SciPy'] as const) {
  const asked = checks.filter((check) => check.program === program);
  // A program that is missing has no answers; the step says so, a suite without tests would fail.
  if (found[program] === null) continue;
  describe(`asked of ${program}`, () => {
    for (const check of asked) {
      it(check.name, () => {
        const theirs = answers.get(check) ?? [];
        expect(theirs).toHaveLength(check.rows.length);
        expect(check.rows.length).toBeGreaterThan(0);
        const differences = theirs.flatMap((answer, row) => compareRow(check, row, answer));
        expect(differences, check.tolerance.because).toEqual([]);
      });
    }
  });
}
