import { describe, expect, it } from 'vitest';
import { timeLeftS } from '@/lib/queue/pace';

const start = '2026-05-01T12:00:00.000Z';
const job = (change = {}) => ({
  status: 'running',
  doneCount: 250,
  totalCount: 400,
  payload: { paceAt: start, paceDone: 200 },
  ...change,
});
const secondsOn = (seconds: number) => new Date(Date.parse(start) + seconds * 1000);

describe('timeLeftS(job, now)', () => {
  it('counts the pace from where this attempt began, not from what an earlier one stored', () => {
    expect(timeLeftS(job(), secondsOn(10))).toBe(30);
  });

  it('is null before anything is done, and for a job that does not run', () => {
    expect(timeLeftS(job({ doneCount: 200 }), secondsOn(10))).toBeNull();
    expect(timeLeftS(job({ payload: {} }), secondsOn(10))).toBeNull();
    expect(timeLeftS(job({ status: 'done' }), secondsOn(10))).toBeNull();
  });

  it('falls to 0 at the end', () => {
    expect(timeLeftS(job({ doneCount: 400 }), secondsOn(10))).toBe(0);
  });
});
