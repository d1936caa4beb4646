import { describe, expect, it } from 'vitest';
import { describeWait } from '@/lib/access/attempts';

describe('describeWait(seconds)', () => {
  it.each([
    [1, '1 second'],
    [40, '40 seconds'],
    [119, '119 seconds'],
    [120, '2 minutes'],
    [121, '3 minutes'],
    [900, '15 minutes'],
  ])('says %i s as %s, never shorter than it is', (seconds, words) => {
    expect(describeWait(seconds)).toBe(words);
  });
});
