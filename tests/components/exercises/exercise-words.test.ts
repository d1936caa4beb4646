import { describe, expect, it } from 'vitest';
import { handedInWords } from '@/components/exercises/exercise-words';
import type { ParticipantView, SubmissionView } from '@/lib/schemas/exercises';

const submission: SubmissionView = {
  id: '00000000-0000-4000-8000-000000000001',
  number: 1,
  run: { id: '00000000-0000-4000-8000-000000000002', number: 1, analysis: 'A-1' },
  remark: '',
  submittedAt: '2026-03-05T10:00:00.000Z',
  differences: [],
  stated: {
    quantity: 'host_fraction',
    limit: 0.058,
    isConstrained: true,
    credibleLevel: 0.95,
    sentence: '',
    conditions: [],
  },
  difference: 'no change at 2 digits',
  comment: null,
  commentedBy: null,
  commentedAt: null,
};

const withRuns = (runs: number): ParticipantView => ({
  person: { id: `00000000-0000-4000-8000-00000000001${runs}`, name: 'A student' },
  state: runs > 0 ? 'handed-in' : 'begun',
  analysis: 'A-1',
  startedAt: '2026-03-05T09:00:00.000Z',
  submissions: Array.from({ length: runs }, () => submission),
});

describe('what was handed in, in words', () => {
  it('counts runs, and the people who handed them in', () => {
    expect(handedInWords([withRuns(1)], 1)).toBe('1 run handed in by 1 of 1 who began it');
    expect(handedInWords([withRuns(2), withRuns(1), withRuns(0)], 3)).toBe(
      '3 runs handed in by 2 of 3 who began it',
    );
    expect(handedInWords([withRuns(0)], 1)).toBe('no run yet; begun by 1');
  });
});
