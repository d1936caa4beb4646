import { describe, expect, it } from 'vitest';
import { countPages, MOST_BYTES } from '@/lib/local/page-sizes.mjs';
import {
  addCounts,
  countCommand,
  countLockfile,
  countPlaywright,
  countRanks,
  countVitest,
} from '@/lib/local/test-counts.mjs';

const vitest = (changes: Record<string, unknown>) => ({
  numPassedTests: 0,
  numFailedTests: 0,
  numPendingTests: 0,
  numTodoTests: 0,
  testResults: [],
  ...changes,
});

const playwright = (stats: Record<string, number>, errors: { message: string }[] = []) => ({
  stats: { expected: 0, unexpected: 0, flaky: 0, skipped: 0, ...stats },
  errors,
});

describe('countVitest(report, code)', () => {
  it('takes over passed and failed tests', () => {
    const count = countVitest(vitest({ numPassedTests: 7, numFailedTests: 2 }), 1);
    expect(count).toMatchObject({ passed: 7, failed: 2 });
  });

  it('counts a file that does not load as a failure', () => {
    const testResults = [
      { name: 'a.test.ts', status: 'failed', message: 'no such module', assertionResults: [] },
    ];
    const count = countVitest(vitest({ numPassedTests: 7, testResults }), 1);
    expect(count).toMatchObject({ passed: 7, failed: 1, notes: ['a.test.ts\nno such module'] });
  });

  it('counts a hook that failed after its tests as a failure', () => {
    const testResults = [
      {
        name: 'a',
        status: 'failed',
        message: 'left open',
        assertionResults: [{ status: 'passed' }],
      },
    ];
    expect(countVitest(vitest({ numPassedTests: 1, testResults }), 1).failed).toBe(1);
  });

  it('counts an error outside of every test as a failure', () => {
    expect(countVitest(vitest({ numPassedTests: 3 }), 1)).toMatchObject({ passed: 3, failed: 1 });
  });

  it('refuses tests that were set aside, and a run without any', () => {
    expect(
      countVitest(vitest({ numPassedTests: 3, numPendingTests: 1, numTodoTests: 1 }), 0).failed,
    ).toBe(2);
    expect(countVitest(vitest({}), 0)).toEqual({ passed: 0, failed: 1, notes: ['No test ran'] });
  });
});

describe('countPlaywright(report, code)', () => {
  it('counts what passed only when repeated, and what was set aside, as failures', () => {
    const report = playwright({ expected: 4, unexpected: 1, flaky: 1, skipped: 1 });
    expect(countPlaywright(report, 1)).toMatchObject({ passed: 4, failed: 3 });
  });

  it('refuses an empty run and reports errors outside of tests', () => {
    expect(countPlaywright(playwright({}), 0).failed).toBe(1);
    const count = countPlaywright(playwright({ expected: 1 }, [{ message: 'no browser' }]), 1);
    expect(count).toEqual({ passed: 1, failed: 1, notes: ['no browser'] });
  });
});

describe('countRanks(report)', () => {
  const violation = { rule: { name: 'no-circles', severity: 'error' }, from: 'a.ts', to: 'b.ts' };

  it('fails when no TypeScript file was read, though nothing was found wrong', () => {
    const report = { modules: [{ source: 'a.mjs' }], summary: { violations: [] } };
    expect(countRanks(report).failed).toBe(1);
  });

  it('names each wrong import', () => {
    const report = { modules: [{ source: 'a.ts' }], summary: { violations: [violation] } };
    expect(countRanks(report).notes).toEqual(['no-circles: a.ts imports b.ts']);
  });
});

describe('the other counts', () => {
  it('countCommand gives the output of what failed', () => {
    expect(countCommand({ code: 0, output: 'warned' })).toEqual({
      passed: 1,
      failed: 0,
      notes: [],
    });
    expect(countCommand({ code: 2, output: 'wrong\n' })).toEqual({
      passed: 0,
      failed: 1,
      notes: ['wrong'],
    });
  });

  it('countLockfile refuses download addresses', () => {
    expect(countLockfile('{ "version": "1.0.0" }').failed).toBe(0);
    expect(countLockfile('{\n "resolved": "ftp://example.org/a.tgz"\n}').failed).toBe(1);
  });

  it('addCounts adds', () => {
    const one = { passed: 1, failed: 2, notes: ['a'] };
    expect(addCounts([one, one])).toEqual({ passed: 2, failed: 4, notes: ['a', 'a'] });
  });
});

describe('countPages(pages)', () => {
  const page = (bytes: number) => ({ page: `/${bytes}`, bytes, files: [] });

  it('fails for each page that loads too much, and names it', () => {
    const count = countPages([page(MOST_BYTES + 1), page(MOST_BYTES)]);
    expect(count).toMatchObject({ passed: 1, failed: 1 });
    expect(count.notes[0]).toContain('1 of 2 pages above 200 kB');
    expect(count.notes[0]).toContain('/200001');
  });

  it('fails where there is no page', () => {
    expect(countPages([]).failed).toBe(1);
  });
});
