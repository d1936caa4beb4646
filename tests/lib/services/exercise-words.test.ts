import { describe, expect, it } from 'vitest';
import type { StatedLimit } from '@/lib/schemas/exercises';
import { limitDifferenceWords } from '@/lib/services/exercise-words';

const stated = (limit: number): StatedLimit => ({
  quantity: 'host_fraction',
  limit,
  isConstrained: true,
  credibleLevel: 0.95,
  sentence: '',
  conditions: [],
});

describe('the difference of two limits', () => {
  it('is that of the numbers as they are shown', () => {
    // 5.84 and 2.75 are shown as 5.8 and 2.8; unrounded they differ by 3.1.
    expect(limitDifferenceWords(stated(0.0584), stated(0.0275))).toBe('−3.0 points');
    expect(limitDifferenceWords(stated(0.0584), stated(0.12))).toBe('+6.2 points');
    expect(limitDifferenceWords(stated(0.00814), stated(0.0102))).toBe('+0.19 points');
  });

  it('is none where both read the same', () => {
    expect(limitDifferenceWords(stated(0.0576), stated(0.0578))).toBe('no change at 2 digits');
  });
});
