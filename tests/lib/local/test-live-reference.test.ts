import { describe, expect, it } from 'vitest';
import { countNotRun } from '@/lib/local/test-live-reference.mjs';

const count = { passed: 29, failed: 0, notes: [] };
const missing = [
  { program: 'R' as const, packages: ['r-base-core'] },
  { program: 'SciPy' as const, packages: ['python3-scipy', 'python3-astropy'] },
];

describe('countNotRun(count, missing, isContinuous)', () => {
  it('names each program that is missing and what would bring it', () => {
    const { passed, failed, notRun } = countNotRun(count, missing, false);
    expect([passed, failed]).toEqual([29, 0]);
    expect(notRun).toHaveLength(2);
    expect(notRun[0]).toContain('against R, since r-base-core is not installed');
    expect(notRun[1]).toContain('python3-scipy, python3-astropy are not installed');
  });

  it('fails once a program where nobody would read that', () => {
    const { passed, failed, notes, notRun } = countNotRun(count, missing, true);
    expect([passed, failed, notRun.length]).toEqual([29, 2, 0]);
    expect(notes[0]).toContain('Did not run: the checks against R');
  });

  it('leaves a count alone when nothing is missing', () => {
    expect(countNotRun(count, [], true)).toEqual({ ...count, notRun: [] });
  });
});
