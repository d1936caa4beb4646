import { describe, expect, it } from 'vitest';
import { findWidest } from '@/app/newest-run';
import type { RunSummary } from '@/lib/schemas/runs';

const runOf = (id: string, stars: number | null, finishedAt: string) =>
  ({ id, stars, finishedAt, limit: 0.1, job: { status: 'done' } }) as unknown as RunSummary;

describe('the run whose maps serve previews', () => {
  it('is the one with the most stars, the newest of equals, and no unfinished one', () => {
    const wide = runOf('wide', 94, '2026-05-01T00:00:00.000Z');
    const wideAgain = runOf('wide again', 94, '2026-05-02T00:00:00.000Z');
    const small = runOf('small', 12, '2026-06-01T00:00:00.000Z');
    const unfinished = { ...runOf('open', 500, ''), limit: null };
    expect(findWidest([{ runs: [small, wide] }])?.run.id).toBe('wide');
    const all = [{ runs: [small, unfinished] }, { runs: [wide, wideAgain] }];
    expect(findWidest(all)?.run.id).toBe('wide again');
    expect(findWidest([{ runs: [unfinished] }])).toBeUndefined();
  });
});
